import { describe, expect, it } from 'vitest';
import { type Levers, leversSchema, type Scenario } from '#shared/facts/scenario.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { hourlyExportOf } from '#shared/try/hourly-export.ts';
import type { Outcome } from '#shared/try/outcome.ts';
import { differenceSentence } from '#shared/try/sentence.ts';
import { type TryBasis, tryLevers } from '#shared/try/try-levers.ts';
import { cents, dollarsText } from '#shared/units/cents.ts';
import { type Day, day } from '#shared/units/day.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { MOST_BESIDE, sideBySide, TRIED_KEY, workedOut } from '#src/features/try/beside.ts';
import { changeLook } from '#src/features/try/line-look.ts';
import { saidParts } from '#src/features/try/said-parts.ts';
import { lineSpan } from '#src/features/try/try-chart.ts';
import { linesSummary, tryLines } from '#src/features/try/try-lines.ts';
import { tryRows } from '#src/features/try/try-rows.ts';
import { sampleFacts } from '#tests/support/sample-facts.ts';

const facts = await sampleFacts();
const { basis } = computeLedger(facts, { today: day('2026-12-01') });
if (basis === null) throw new Error('the sample can be projected');
const start: TryBasis = { basis, hourly: hourlyExportOf(facts.intervals) };
const NONE = leversSchema.parse({});
const SPRING = day('2027-04-01');

function shownOf(levers: Partial<Levers>) {
  const all = { ...NONE, ...levers };
  const tried = tryLevers(start, all);
  if (!tried.ok) throw new Error(tried.why);
  return { levers: all, outcome: tried.outcome, assumed: tried.assumed };
}
const base = shownOf({}).outcome;
const paydown = { on: SPRING, amountCents: cents(550_500), reamortize: true };
const changes: Partial<Levers>[] = [
  { paydown },
  { cash: true },
  { exportCut: { from: SPRING, keep: '0.37' } },
  { sale: { on: day('2034-11-09'), roofValueCents: cents(800_000) } },
];

describe('the table of what changes', () => {
  it('shows only amounts that their own workings come to, in every column', () => {
    let proved = 0;
    for (const { levers, outcome } of [shownOf({}), ...changes.map(shownOf)]) {
      const soldOn = levers.sale?.on ?? null;
      for (const row of tryRows(25, soldOn ? [soldOn] : [])) {
        const cell = row.cell({ outcome, soldOn });
        if (cell.kind === 'money' && cell.working) {
          expect(evaluateWorking(cell.working).toFixed(2), row.key).toBe(dollarsText(cell.cents));
          proved += 1;
        }
        const difference = row.difference(base, { outcome, soldOn });
        if (difference?.kind === 'money') {
          expect(evaluateWorking(difference.working).toFixed(2), row.key).toBe(dollarsText(difference.cents));
          proved += 1;
        }
      }
    }
    expect(proved).toBeGreaterThan(20);
  });

  it('calls more settled and less interest good, and a payment neither', () => {
    const { outcome } = shownOf({ paydown });
    const good = Object.fromEntries(
      tryRows(25).map((row) => [row.key, row.difference(base, { outcome, soldOn: null })?.good]),
    );
    expect(good).toMatchObject({ even: true, settled: true, interest: true, payment: null, firstYear: null });
  });

  it('says how much sooner or later the day is, in years and months', () => {
    const even = (evenOn: Day | null): Outcome => ({ ...base, evenOn, paidOffOn: evenOn });
    const [row] = tryRows(25);
    const said = (before: Day | null, after: Day | null) => {
      const difference = row?.difference(even(before), { outcome: even(after), soldOn: null });
      return difference?.kind === 'words' ? difference.text : null;
    };
    expect(said(day('2037-12-14'), day('2037-05-14'))).toBe('7 months sooner');
    expect(said(day('2037-01-14'), day('2039-02-14'))).toBe('2 years and 1 month later');
    expect(said(day('2037-01-14'), day('2038-01-20'))).toBe('1 year later');
    expect(said(day('2037-01-14'), day('2037-01-20'))).toBe('the same');
    expect(said(null, day('2037-01-14'))).toBe('now within');
    expect(said(day('2037-01-14'), null)).toBe('no longer');
    expect(said(null, null)).toBeNull();
    const paidOff = tryRows(25).find((one) => one.key === 'paidOff');
    expect(paidOff?.difference(even(day('2037-01-14')), { outcome: even(day('2037-01-13')), soldOn: null })).toEqual({
      kind: 'words',
      text: '1 day sooner',
      good: null,
    });
  });

  it('sets a sale against the same day as things stand, and not against the horizon', () => {
    const soldOn = day('2034-11-09');
    const { outcome } = shownOf({ sale: { on: soldOn, roofValueCents: cents(800_000) } });
    const rows = new Map(tryRows(25, [soldOn]).map((row) => [row.key, row]));
    const then = base.months.find((month) => month.on >= soldOn)?.settledTodayCents ?? 0;
    expect(rows.get('sold')?.cell({ outcome: base, soldOn: null })).toMatchObject({ cents: then });
    expect(rows.get('sold')?.cell({ outcome, soldOn })).toMatchObject({ cents: outcome.settledCents });
    expect(rows.get('sold')?.difference(base, { outcome, soldOn })).toMatchObject({
      cents: outcome.settledCents - then,
    });
    expect(rows.get('settled')?.cell({ outcome, soldOn })).toEqual({ kind: 'none', text: 'sold before' });
    expect(rows.get('settled')?.difference(base, { outcome, soldOn })).toBeNull();
    expect(tryRows(25).map((row) => row.key)).not.toContain('sold');
    const twice = tryRows(25, [soldOn, day('2040-01-01')]).find((row) => row.key === 'sold');
    expect(twice?.cell({ outcome: base, soldOn: null })).toEqual({ kind: 'none', text: 'the days differ' });
    expect(twice?.cell({ outcome, soldOn })).toMatchObject({ kind: 'money' });
  });

  it('says in words what has no figure', () => {
    const nothing: Outcome = {
      ...base,
      evenOn: null,
      paidOffOn: null,
      paymentCents: null,
      firstYearAvoidedCents: null,
    };
    const texts = tryRows(25).flatMap((row) => {
      const cell = row.cell({ outcome: nothing, soldOn: null });
      return cell.kind === 'none' ? [cell.text] : [];
    });
    expect(texts).toEqual(['not within 25 years', 'no loan', 'no loan', 'not a whole year']);
    expect(tryRows(25).map((row) => row.difference(base, { outcome: nothing, soldOn: null })?.kind ?? null)).toContain(
      null,
    );
  });
});

describe('changes side by side', () => {
  const kept: Scenario[] = changes.map((levers, index) => ({
    id: `kept-${index}`,
    name: `Kept ${index}`,
    levers: { ...NONE, ...levers },
    createdOn: day('2026-12-01'),
  }));
  const all = workedOut(
    start,
    kept,
    kept.map((one) => one.id),
  );

  it('are those chosen, worked out as the levers alone would be', () => {
    expect(all.failed).toEqual([]);
    expect(all.beside.map((one) => one.outcome)).toEqual(kept.map((one) => shownOf(one.levers).outcome));
    expect(workedOut(start, kept, ['kept-2', 'gone']).beside.map((one) => one.key)).toEqual(['kept-2']);
  });

  it('leave out one whose day has gone by, and say why', () => {
    const old: Scenario = {
      id: 'old',
      name: 'Old',
      levers: { ...NONE, paydown: { ...paydown, on: day('2020-01-01') } },
      createdOn: day('2019-12-01'),
    };
    const found = workedOut(start, [old], ['old']);
    expect(found.beside).toEqual([]);
    expect(found.failed).toMatchObject([{ id: 'old', name: 'Old' }]);
  });

  it('are never more than four, the one being tried first', () => {
    const shown = shownOf({ paydown: { ...paydown, reamortize: false } });
    const columns = sideBySide(shown, null, all.beside);
    expect(columns).toHaveLength(MOST_BESIDE);
    expect(columns[0]?.key).toBe(TRIED_KEY);
    expect(columns[0]?.name).toBe('This change');
  });

  it('show an opened change once, under its own name, until a lever moves', () => {
    const [first] = kept;
    if (!first) throw new Error('there is one');
    const same = sideBySide(shownOf(first.levers), first, all.beside.slice(0, 2));
    expect(same.map((one) => one.name)).toEqual(['Kept 0', 'Kept 1']);
    const moved = sideBySide(shownOf({ paydown: { ...paydown, reamortize: false } }), first, all.beside.slice(0, 2));
    expect(moved.map((one) => one.name)).toEqual(['This change', 'Kept 0', 'Kept 1']);
  });

  it('are only the kept ones while no lever is pulled', () => {
    expect(sideBySide(shownOf({}), null, all.beside.slice(0, 1)).map((one) => one.key)).toEqual(['kept-0']);
    expect(sideBySide(null, null, [])).toEqual([]);
  });

  it('are lines that differ in letter, colour and dash', () => {
    const looks = [0, 1, 2, 3].map(changeLook);
    for (const part of ['letter', 'token', 'dash'] as const) {
      expect(new Set(looks.map((look) => String(look[part]))).size, part).toBe(4);
    }
  });

  it('are said in the chart’s own words, with the day and the end of each line', () => {
    const lines = tryLines(base, all.beside.slice(0, 1));
    const summary = linesSummary(lines);
    expect(summary).toMatch(/As things stand: even in [A-Z][a-z]{2} 20\d\d, \$[\d,]+ in/);
    expect(summary).toContain('Kept 0: even in');
    expect(lineSpan(lines)).toEqual({ first: base.months[0]?.on, last: base.months.at(-1)?.on });
    expect(lineSpan([])).toBeNull();
  });
});

describe('the headline', () => {
  it('is the whole sentence in its parts while few levers are pulled', () => {
    const { levers, outcome } = shownOf({ paydown });
    const said = differenceSentence(levers, base, outcome) ?? '';
    const { what, first, rest } = saidParts(said, levers);
    expect(`${what} ${first}${rest}`).toBe(said);
    expect(what).toMatch(/^Paying .*:$/);
    expect(first).toMatch(/^even in/);
  });

  it('counts the levers once there are more than three', () => {
    const { levers, outcome } = shownOf({
      paydown,
      priceRise: '0.03',
      degradation: '0.007',
      exportCut: { from: SPRING, keep: '0.5' },
    });
    const { what } = saidParts(differenceSentence(levers, base, outcome) ?? '', levers);
    expect(what).toBe('With these 4 changes together:');
  });
});
