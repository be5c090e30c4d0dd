import type { StructureCase, StructureMaximum } from './structure-cases.ts';

/** A value of a maximum that is compared. */
export interface ComparedValue {
  readonly quantity: 'horizontal' | 'vertical' | `cable ${number}`;
  readonly pick: (maximum: StructureMaximum) => number;
}

/** A weaker component is compared down to 20 dB below the stronger one: below, it decides no level. */
const COMPARED_RATIO = 10;

/** The components of a maximum that count, the stronger one first, and the current of every cable. */
export function comparedStructureValues(maximum: StructureMaximum): ComparedValue[] {
  const { horizontalVPerM, verticalVPerM, cableCurrentsA } = maximum;
  const horizontal: ComparedValue = { quantity: 'horizontal', pick: (row) => row.horizontalVPerM };
  const vertical: ComparedValue = { quantity: 'vertical', pick: (row) => row.verticalVPerM };
  const isHorizontal = horizontalVPerM >= verticalVPerM;
  const [strong, weak] = isHorizontal ? [horizontal, vertical] : [vertical, horizontal];
  const fields = weak.pick(maximum) * COMPARED_RATIO >= strong.pick(maximum) ? [strong, weak] : [strong];
  const currents = cableCurrentsA.map(
    (_, i): ComparedValue => ({ quantity: `cable ${i + 1}`, pick: (row) => row.cableCurrentsA[i] ?? Number.NaN }),
  );
  return [...fields, ...currents];
}

/** One value at one frequency: reference, estimate (peak phasors, V/m or A) and their ratio in dB. */
export interface StructureComparison {
  readonly caseId: string;
  readonly frequencyHz: number;
  readonly quantity: ComparedValue['quantity'];
  readonly expected: number;
  readonly computed: number;
  readonly differenceDb: number;
}

/** Everything that is compared of a case: `stored` reference rows against `computed` ones of the same frequencies. */
export function compareStructure(
  { id }: StructureCase,
  stored: readonly StructureMaximum[],
  computed: readonly StructureMaximum[],
): StructureComparison[] {
  const byHz = new Map(computed.map((row) => [Math.round(row.frequencyHz), row]));
  return stored.flatMap((reference) => {
    const own = byHz.get(Math.round(reference.frequencyHz));
    return comparedStructureValues(reference).map(({ quantity, pick }) => {
      const expected = pick(reference);
      const value = own === undefined ? Number.NaN : pick(own);
      return {
        caseId: id,
        frequencyHz: reference.frequencyHz,
        quantity,
        expected,
        computed: value,
        differenceDb: 20 * Math.log10(value / expected),
      };
    });
  });
}
