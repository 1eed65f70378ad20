import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Levers, leversSchema } from '#shared/facts/scenario.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { draftOf } from '#src/features/try/draft.ts';
import { hourWords } from '#src/features/try/house-levers.tsx';
import { readKept } from '#src/features/try/keep-dialog.tsx';
import { LEVER_NAMES, type LeverTexts, PASTED, textsOf, untouched } from '#src/features/try/lever-texts.ts';
import { readLevers } from '#src/features/try/read-levers.ts';
import { dollarScale, kwhScale, percentScale, wholeScale } from '#src/features/try/scales.ts';
import { sampleFacts } from '#tests/support/sample-facts.ts';

const facts = await sampleFacts();
const { basis } = computeLedger(facts, { today: day('2026-12-01') });
if (basis === null) throw new Error('the sample can be projected');
const { plans } = basis.facts;
const rest = untouched(basis);
const NONE = leversSchema.parse({});

function pulled(part: Partial<LeverTexts>): LeverTexts {
  return { ...rest, ...part };
}
const faultsOf = (texts: LeverTexts) => {
  const reading = readLevers(texts, plans);
  return reading.ok ? [] : reading.faults.map((fault) => fault.path);
};

describe('the levers as texts', () => {
  it('begin let go, at the record’s own figures', () => {
    expect(LEVER_NAMES.every((name) => !rest[name].pulled)).toBe(true);
    expect(readLevers(rest, plans)).toEqual({ ok: true, body: NONE });
    expect(rest.priceRise.percent).toBe('2.5');
    expect(rest.degradation.percent).toBe('0.5');
    expect(rest.paydown.on).toBe('2027-01-01');
  });

  it('each read without a fault as soon as pulled, save a plan that must be pasted', () => {
    for (const name of LEVER_NAMES.filter((one) => one !== 'plan')) {
      expect(faultsOf({ ...rest, [name]: { ...rest[name], pulled: true } })).toEqual([]);
    }
    expect(faultsOf(pulled({ plan: { ...rest.plan, pulled: true, which: PASTED } }))).toEqual(['plan.json']);
  });

  it('say the same levers as were opened, whatever they are', () => {
    const on = fc.integer({ min: 1, max: 9000 }).map((days) => addDays(day('2026-12-01'), days));
    const amount = fc.integer({ min: 1, max: 10_000_000 }).map(cents);
    const fraction = fc.integer({ min: 0, max: 1000 }).map((tenths) => fractionText(tenths));
    const maybe = <T>(one: fc.Arbitrary<T>) => fc.option(one, { nil: null });
    const levers: fc.Arbitrary<Levers> = fc.record({
      paydown: maybe(fc.record({ on, amountCents: amount, reamortize: fc.boolean() })),
      cash: fc.boolean(),
      refinance: maybe(
        fc.record({
          on,
          annualRate: fraction,
          termMonths: fc.integer({ min: 1, max: 480 }),
          costsCents: amount,
        }),
      ),
      priceRise: maybe(fraction),
      exportCut: maybe(fc.record({ from: on, keep: fraction })),
      plan: maybe(fc.record({ from: on, plan: fc.constantFrom(...plans.map((one) => one.plan)) })),
      moreUse: maybe(
        fc.record({
          from: on,
          whPerDay: fc.integer({ min: 0, max: 100_000 }).map(wh),
          fromHour: fc.integer({ min: 0, max: 23 }),
          toHour: fc.integer({ min: 1, max: 24 }),
        }),
      ),
      degradation: maybe(fraction),
      replacement: maybe(fc.record({ on, costCents: amount })),
      sale: maybe(fc.record({ on, roofValueCents: amount })),
    });
    fc.assert(
      fc.property(levers, (one) => {
        expect(readLevers(textsOf(one, plans, rest), plans)).toEqual({ ok: true, body: one });
        // A plan that the household has no longer comes back as it was pasted.
        expect(readLevers(textsOf(one, [], rest), [])).toEqual({ ok: true, body: one });
      }),
      { numRuns: 60 },
    );
  });

  it('name every field that does not read, and only fields of levers that are pulled', () => {
    const broken: Partial<LeverTexts> = {
      paydown: { pulled: true, on: '', amountCents: '0', reamortize: true },
      refinance: { pulled: true, on: '2027-04-01', annualRate: 'five', termMonths: '0', costsCents: '-1' },
      exportCut: { pulled: false, from: '', keep: '' },
      moreUse: { pulled: true, from: '2027-04-01', whPerDay: '-8', fromHour: '22', toHour: '6' },
      priceRise: { pulled: true, percent: '' },
    };
    expect(faultsOf(pulled(broken))).toEqual([
      'paydown.on',
      'paydown.amountCents',
      'refinance.annualRate',
      'refinance.termMonths',
      'refinance.costsCents',
      'priceRise',
      'moreUse.whPerDay',
    ]);
  });

  it('take a pasted plan with or without its day, the same object for the same text, and refuse what does not hold together', () => {
    const [first] = plans;
    if (!first) throw new Error('the sample has a plan');
    const read = (json: string) =>
      readLevers(pulled({ plan: { pulled: true, from: '2027-04-01', which: PASTED, json } }), plans);
    const plain = read(JSON.stringify(first.plan));
    const again = read(JSON.stringify(first.plan));
    const dated = read(JSON.stringify(first));
    if (!plain.ok || !again.ok || !dated.ok) throw new Error('a plan of the sample is a plan');
    expect(plain.body.plan?.plan).toEqual(first.plan);
    expect(again.body.plan?.plan).toBe(plain.body.plan?.plan);
    expect(dated.body.plan?.plan).toEqual(first.plan);
    for (const wrong of ['', '{', '{}', JSON.stringify({ ...first.plan, charges: [{ id: 'x' }] })]) {
      expect(read(wrong)).toMatchObject({ ok: false, faults: [{ path: 'plan.json' }] });
    }
  });
});

describe('a draft that was left', () => {
  it('comes back as it was typed', () => {
    const texts = pulled({ paydown: { pulled: true, on: '2027-04-', amountCents: '5,5', reamortize: false } });
    const draft = { texts, openedId: 'a', besideIds: ['b'] };
    expect(draftOf(JSON.parse(JSON.stringify(draft)), rest)).toEqual(draft);
  });

  it('begins anew where it does not read, and fills in what it does not hold', () => {
    const fresh = { texts: rest, openedId: null, besideIds: [] };
    for (const value of [null, 7, {}, { texts: 1, openedId: null, besideIds: [] }]) {
      expect(draftOf(value, rest)).toEqual(fresh);
    }
    const older = draftOf(
      { texts: { sale: { pulled: 'yes', on: '2030-01-01' } }, openedId: null, besideIds: [] },
      rest,
    );
    expect(older.texts).toEqual(pulled({ sale: { ...rest.sale, on: '2030-01-01' } }));
  });
});

describe('a slider', () => {
  it('says what can be typed, and reads it back', () => {
    const scales = [dollarScale(2_134_567, 50), percentScale(-2, 10), wholeScale(12, 360, 6), kwhScale(40)];
    for (const scale of scales) {
      for (let at = scale.least; at < scale.most; at += scale.step) expect(scale.at(scale.text(at))).toBe(at);
      expect(scale.at('words')).toBeNull();
    }
  });

  it('ends at the whole amount, to the cent', () => {
    const scale = dollarScale(2_134_567, 50);
    expect(scale.text(scale.most)).toBe('21345.67');
  });
});

describe('keeping a change', () => {
  const scenarios = [
    { id: 'a', name: 'Pay it in' },
    { id: 'b', name: 'Sell' },
  ];

  it('needs a name that no other has', () => {
    const faults = (name: string, inPlace: boolean) => {
      const reading = readKept({ name, inPlace }, scenarios, { id: 'a' });
      return reading.ok ? [] : reading.faults.map((fault) => fault.path);
    };
    expect(faults('  ', false)).toEqual(['name']);
    expect(faults('sell ', true)).toEqual(['name']);
    expect(faults('Pay it in', false)).toEqual(['name']);
    expect(faults('Pay it in', true)).toEqual([]);
  });

  it('takes the place of the opened one only when asked to', () => {
    expect(readKept({ name: 'Pay it in', inPlace: true }, scenarios, { id: 'a' })).toEqual({
      ok: true,
      body: { id: 'a', name: 'Pay it in' },
    });
    const other = readKept({ name: ' Another ', inPlace: false }, scenarios, { id: 'a' });
    expect(other.ok && other.body.name).toBe('Another');
    expect(other.ok && other.body.id).not.toBe('a');
  });
});

it('hours are said as people say them', () => {
  expect([0, 6, 12, 22, 24].map(hourWords)).toEqual(['midnight', '6 am', 'noon', '10 pm', 'midnight']);
});

/** 25 → "0.025" */
function fractionText(thousandths: number): string {
  return String(thousandths / 1000);
}
