import { type Attributes, booleanAttribute, numberAttribute, sizeAttribute } from './attributes.ts';
import { addCurve, addSegment, beginPath, type Path } from './path.ts';

/**
 * Outline of a standard primitive about its own origin, millimetres; undefined when the element is none of them.
 * Rings keep their outer edge only: they serve as clearances, where the inside is small and cut off anyway.
 */
export function primitivePath(element: string, attributes: Attributes, mmPerUnit: number): Path | undefined {
  const size = (name: string): number => sizeAttribute(element, attributes, name) * mmPerUnit;
  switch (element) {
    case 'Circle':
      return circle(size('diameter'));
    case 'Donut':
    case 'Thermal':
      return circle(size('outerDiameter'));
    case 'RectCenter':
      return rectangle(size('width'), size('height'));
    case 'RectCorner':
      return rectangleBetween(element, attributes, mmPerUnit);
    case 'RectRound':
      return cutRectangle(size('width'), size('height'), size('radius'), attributes, true);
    case 'RectCham':
      return cutRectangle(size('width'), size('height'), size('chamfer'), attributes, false);
    case 'Oval':
      return oval(size('width'), size('height'));
    case 'Ellipse':
      return regularPolygon(size('width'), size('height'), 72);
    case 'Diamond':
      return regularPolygon(size('width'), size('height'), 4);
    case 'Hexagon':
      return regularPolygon(size('length'), size('length'), 6);
    case 'Octagon':
      return regularPolygon(size('length'), size('length'), 8);
    case 'Triangle':
      return polygon([
        [-size('base') / 2, -size('height') / 2],
        [size('base') / 2, -size('height') / 2],
        [0, size('height') / 2],
      ]);
    default:
      return undefined;
  }
}

function polygon(corners: readonly (readonly [number, number])[]): Path {
  const path = beginPath(corners[0]![0], corners[0]![1]);
  for (const [x, y] of corners.slice(1)) addSegment(path, x, y);
  return path;
}

function circle(diameterMm: number): Path {
  const path = beginPath(diameterMm / 2, 0);
  addCurve(path, diameterMm / 2, 0, 0, 0, false);
  return path;
}

const rectangle = (widthMm: number, heightMm: number): Path =>
  polygon([
    [-widthMm / 2, -heightMm / 2],
    [widthMm / 2, -heightMm / 2],
    [widthMm / 2, heightMm / 2],
    [-widthMm / 2, heightMm / 2],
  ]);

function rectangleBetween(element: string, attributes: Attributes, mmPerUnit: number): Path {
  const at = (name: string): number => numberAttribute(element, attributes, name) * mmPerUnit;
  const [x0, y0, x1, y1] = [at('lowerLeftX'), at('lowerLeftY'), at('upperRightX'), at('upperRightY')];
  return polygon([
    [x0, y0],
    [x1, y0],
    [x1, y1],
    [x0, y1],
  ]);
}

/** Corners with a flag that says false stay square; without flags all are cut. */
function cutRectangle(widthMm: number, heightMm: number, cut: number, attributes: Attributes, round: boolean): Path {
  const cutMm = Math.min(cut, widthMm / 2, heightMm / 2);
  const [w, h] = [widthMm / 2, heightMm / 2];
  const path = beginPath(0, -h);
  // Counter-clockwise; [corner, direction of arrival, direction of departure].
  const corners = [
    ['lowerRight', w, -h, 1, 0, 0, 1],
    ['upperRight', w, h, 0, 1, -1, 0],
    ['upperLeft', -w, h, -1, 0, 0, -1],
    ['lowerLeft', -w, -h, 0, -1, 1, 0],
  ] as const;
  for (const [flag, x, y, inX, inY, outX, outY] of corners) {
    if (!booleanAttribute(attributes, flag, true)) {
      addSegment(path, x, y);
      continue;
    }
    const [x0, y0] = [x - inX * cutMm, y - inY * cutMm];
    const [x1, y1] = [x + outX * cutMm, y + outY * cutMm];
    addSegment(path, x0, y0);
    if (round) addCurve(path, x1, y1, x0 + outX * cutMm, y0 + outY * cutMm, false);
    else addSegment(path, x1, y1);
  }
  return path;
}

const oval = (widthMm: number, heightMm: number): Path =>
  cutRectangle(widthMm, heightMm, Math.min(widthMm, heightMm) / 2, {}, true);

function regularPolygon(widthMm: number, heightMm: number, corners: number): Path {
  const points: [number, number][] = [];
  for (let i = 0; i < corners; i++) {
    const angleRad = (2 * Math.PI * i) / corners;
    points.push([(widthMm / 2) * Math.cos(angleRad), (heightMm / 2) * Math.sin(angleRad)]);
  }
  return polygon(points);
}
