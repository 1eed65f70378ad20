import { describe, expect, it } from 'vitest';
import { mergeDay } from '#server/services/log/merge-day.ts';
import type { IntervalDay } from '#shared/facts/papers.ts';
import { day } from '#shared/units/day.ts';

const dayOf = (values: (number | null)[]): IntervalDay => ({
  channel: 'monitor',
  day: day('2026-06-10'),
  minutes: 360,
  values,
  documentId: null,
});

describe('a day of a file held against the same day here', () => {
  it('is the same within a watt-hour of rounding, and what is here stays', () => {
    expect(mergeDay(dayOf([0, 1000, 2000, 0]), dayOf([0, 1001, 1999, 0]))).toEqual({ kind: 'same' });
    const fuller = mergeDay(dayOf([0, 1000, null, 0]), dayOf([0, 1001, 1999, 0]));
    expect(fuller.kind === 'fuller' && fuller.day.values).toEqual([0, 1000, 1999, 0]);
  });

  it('differs from two watt-hours on, and asks', () => {
    const found = mergeDay(dayOf([0, 1000, 2000, 0]), dayOf([0, 1002, 2000, 0]));
    expect(found.kind === 'different' && found.day.values).toEqual([0, 1002, 2000, 0]);
  });

  it('a missing value in the file takes nothing away', () => {
    expect(mergeDay(dayOf([0, 1000, 2000, 0]), dayOf([0, null, 2000, 0]))).toEqual({ kind: 'same' });
  });

  it('differs in another step', () => {
    expect(mergeDay(dayOf([0, 1, 2, 3]), dayOf([1, 5])).kind).toBe('different');
  });
});
