import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { governingEnd, insuranceEnds, insuranceEntries } from '#shared/books/mortgage-insurance.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { addDays, day } from '#shared/units/day.ts';
import { mortgageOf } from './facts.ts';

const FAR = day('2100-01-01');
const dates = (entries: { date: string }[]) => [entries[0]?.date, entries.at(-1)?.date];

describe('mortgage insurance avoided', () => {
  it('runs from the removal to the first of the days it could have gone anyway', () => {
    const entries = insuranceEntries(mortgageOf(), FAR);
    expect(governingEnd(mortgageOf())).toMatchObject({ rule: 'request80', on: '2034-12-01', payment: 127 });
    expect(dates(entries)).toEqual(['2025-09-01', '2034-12-01']);
    expect(entries).toHaveLength(127 - 15);
    expect(sumCents(entries.map((entry) => entry.amountCents))).toBe(112 * 14_250);
  });

  it('ends with the payment of the rule the owner chose', () => {
    const mortgage = mortgageOf({}, { endRule: 'automatic78' });
    expect(governingEnd(mortgage)).toMatchObject({ rule: 'automatic78', payment: 139 });
    expect(dates(insuranceEntries(mortgage, FAR))).toEqual(['2025-09-01', '2035-12-01']);
  });

  it('ends with the last payment before the first of the month after the midpoint, where that is chosen', () => {
    const mortgage = mortgageOf({}, { endRule: 'midpoint' });
    expect(governingEnd(mortgage)).toMatchObject({ on: '2039-06-01', payment: 180 });
    expect(insuranceEntries(mortgage, FAR).at(-1)?.date).toBe('2039-05-01');
  });

  it('takes the owner’s day of appreciation as the prudent end when it is the first', () => {
    const mortgage = mortgageOf({}, { appreciationOn: day('2028-03-20') });
    expect(governingEnd(mortgage)).toMatchObject({ rule: 'appreciation', on: '2028-03-20' });
    expect(insuranceEntries(mortgage, FAR).at(-1)?.date).toBe('2028-03-01');
  });

  it('falls back to the prudent end, and says so, when the chosen rule has no day', () => {
    const end = governingEnd(mortgageOf({}, { endRule: 'appreciation' }));
    expect(end.rule).toBe('request80');
    expect(end.words).toContain('no day');
  });

  it('never runs past a refinance, sale or payoff', () => {
    const mortgage = mortgageOf({ endedOn: day('2027-02-14') });
    expect(governingEnd(mortgage)).toMatchObject({ rule: null, on: '2027-02-14' });
    expect(insuranceEntries(mortgage, FAR).at(-1)?.date).toBe('2027-02-01');
  });

  it('is nothing where the roof was not the cause, or while it is still paid', () => {
    expect(insuranceEntries(mortgageOf({}, { becauseOfRoof: false }), FAR)).toEqual([]);
    expect(insuranceEntries(mortgageOf({}, { removedOn: null }), FAR)).toEqual([]);
    expect(insuranceEntries(mortgageOf({ insurance: null }), FAR)).toEqual([]);
  });

  it('starts with the first payment due on or after the removal', () => {
    expect(insuranceEntries(mortgageOf({}, { removedOn: day('2025-09-02') }), FAR)[0]?.date).toBe('2025-10-01');
  });

  it('applies none of the Act’s rules to an FHA loan, and says an appraisal does not take it off', () => {
    const ends = insuranceEnds(mortgageOf({ kind: 'fha' }));
    expect(ends.map((end) => end.on)).toEqual([null, null, null, null]);
    expect(ends.find((end) => end.rule === 'appreciation')?.words).toContain('refinance');
    // From memory: over 90 % for the whole term, at or under 90 % for eleven years.
    expect(governingEnd(mortgageOf({ kind: 'fha' })).payment).toBe(360);
    expect(governingEnd(mortgageOf({ kind: 'fha', principalCents: cents(32_400_000) })).payment).toBe(132);
  });

  it('is nothing on a VA loan, which carries no monthly insurance', () => {
    expect(insuranceEntries(mortgageOf({ kind: 'va' }), FAR)).toEqual([]);
  });

  it('is zero from the day after its end on, whatever the mortgage', () => {
    fc.assert(
      fc.property(
        fc.record({
          loanToValue: fc.integer({ min: 60, max: 97 }),
          rate: fc.integer({ min: 200, max: 900 }),
          extra: fc.integer({ min: 0, max: 60_000 }),
          endRule: fc.constantFrom('prudent', 'request80', 'automatic78', 'midpoint', 'appreciation'),
          appreciation: fc.option(fc.integer({ min: 400, max: 9_000 })),
          ended: fc.option(fc.integer({ min: 400, max: 9_000 })),
        }),
        ({ loanToValue, rate, extra, endRule, appreciation, ended }) => {
          const start = day('2024-06-01');
          const mortgage = mortgageOf(
            {
              principalCents: cents(360_000 * loanToValue),
              annualRate: `0.${String(rate).padStart(4, '0')}`,
              extraPrincipalMonthlyCents: cents(extra),
              endedOn: ended === null ? null : addDays(start, ended),
            },
            { endRule, appreciationOn: appreciation === null ? null : addDays(start, appreciation) },
          );
          const end = governingEnd(mortgage);
          const entries = insuranceEntries(mortgage, FAR);
          expect(entries.filter((entry) => end.on !== null && entry.date > end.on)).toEqual([]);
          if (mortgage.endedOn !== null) {
            const endedOn = mortgage.endedOn;
            expect(entries.every((entry) => entry.date <= endedOn)).toBe(true);
          }
        },
      ),
      { numRuns: 60 },
    );
  });
});
