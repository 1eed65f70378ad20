import type { IntervalDay } from '#shared/facts/papers.ts';

/** What a day of a file is against the same channel's day that is here already. */
export type DayMerge =
  | { kind: 'new'; day: IntervalDay }
  | { kind: 'same' }
  /** Every value that both have agrees, and the file has some more. */
  | { kind: 'fuller'; day: IntervalDay }
  /** Some value differs; `day` is what it would be with the file's values put in place. */
  | { kind: 'different'; day: IntervalDay };

/**
 * Two files of the same readings may round a step to neighbouring whole Wh, since each carries its remainder from its own first row
 * (common practice, no source).
 */
const ROUNDING_WH = 1;

/** Holds a file's day against the one here; a step within rounding stays as it is here. Days in different steps differ. */
export function mergeDay(here: IntervalDay | null, file: IntervalDay): DayMerge {
  if (here === null) return { kind: 'new', day: file };
  if (here.minutes !== file.minutes || here.values.length !== file.values.length) {
    return { kind: 'different', day: file };
  }
  let differs = false;
  let adds = false;
  const values = file.values.map((value, index) => {
    const known = here.values[index] ?? null;
    if (value === null) return known;
    if (known === null) {
      adds = true;
      return value;
    }
    if (Math.abs(known - value) <= ROUNDING_WH) return known;
    differs = true;
    return value;
  });
  const day = { ...file, values };
  if (differs) return { kind: 'different', day };
  return adds ? { kind: 'fuller', day } : { kind: 'same' };
}
