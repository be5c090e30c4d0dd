import { type Attributes, booleanAttribute, optionalNumber } from './attributes.ts';

/** x' = a·x + c·y + e, y' = b·x + d·y + f. Lengths in millimetres. */
export interface Affine {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly d: number;
  readonly e: number;
  readonly f: number;
}

export const IDENTITY: Affine = { a: 1, b: 0, c: 0, d: 1, e: 0, f: 0 };

export const isIdentity = (m: Affine): boolean =>
  m.a === 1 && m.b === 0 && m.c === 0 && m.d === 1 && m.e === 0 && m.f === 0;

export const translation = (xMm: number, yMm: number): Affine => ({ ...IDENTITY, e: xMm, f: yMm });

/** First `inner`, then `outer`. */
export const combine = (outer: Affine, inner: Affine): Affine => ({
  a: outer.a * inner.a + outer.c * inner.b,
  b: outer.b * inner.a + outer.d * inner.b,
  c: outer.a * inner.c + outer.c * inner.d,
  d: outer.b * inner.c + outer.d * inner.d,
  e: outer.a * inner.e + outer.c * inner.f + outer.e,
  f: outer.b * inner.e + outer.d * inner.f + outer.f,
});

/** Factor on lengths; for line widths. */
export const scaleOf = (m: Affine): number => Math.sqrt(Math.abs(m.a * m.d - m.b * m.c));

/** True when the transform turns counter-clockwise into clockwise. */
export const isMirrored = (m: Affine): boolean => m.a * m.d - m.b * m.c < 0;

/**
 * `Xform`: scale, then mirror (x → −x), then turn counter-clockwise by `rotation` degrees, then shift by the offset.
 * Mirror before rotation is how exported bottom-side parts come out on their pads.
 */
export function readXform(attributes: Attributes, mmPerUnit: number): Affine {
  const scale = optionalNumber('Xform', attributes, 'scale') ?? 1;
  const turnRad = ((optionalNumber('Xform', attributes, 'rotation') ?? 0) * Math.PI) / 180;
  const flip = booleanAttribute(attributes, 'mirror', false) ? -1 : 1;
  const cos = exact(Math.cos(turnRad));
  const sin = exact(Math.sin(turnRad));
  return {
    a: scale * flip * cos,
    b: scale * flip * sin,
    c: -scale * sin,
    d: scale * cos,
    e: (optionalNumber('Xform', attributes, 'xOffset') ?? 0) * mmPerUnit,
    f: (optionalNumber('Xform', attributes, 'yOffset') ?? 0) * mmPerUnit,
  };
}

/** Quarter turns must not leave 6e-17 behind: ends that touch in the file touch after the turn. */
const exact = (value: number): number =>
  Math.abs(value) < 1e-15 ? 0 : Math.abs(Math.abs(value) - 1) < 1e-15 ? Math.sign(value) : value;
