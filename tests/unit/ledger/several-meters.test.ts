import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { ReadChannel, RegisterRead, Statement } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import type { Cycle } from '#shared/ledger/cycle.ts';
import { assembleCycles } from '#shared/ledger/cycles.ts';
import { wh } from '#shared/units/energy.ts';
import { BUILT_TODAY, type BuildOptions, buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';

type Change = (statement: Statement, at: number) => Statement;

function eachStatement(facts: HouseholdFacts, change: Change): HouseholdFacts {
  return { ...facts, statements: facts.statements.map(change) };
}

function cyclesOf(facts: HouseholdFacts): Cycle[] {
  return assembleCycles(facts).cycles.map((one) => one.cycle);
}

function differing(cycle: Cycle | undefined): string[] {
  return (cycle?.checks ?? []).filter((one) => one.verdict === 'differs').map((one) => one.key);
}

/** A read of another meter over the same days. Registers wind on by the month's place, so that they follow each other. */
function readOf(meter: string, channel: ReadChannel, statement: Statement, at: number, kwh: number): RegisterRead {
  return {
    meter,
    channel,
    from: statement.from,
    to: statement.to,
    previous: String(1000 + at * kwh),
    current: String(1000 + (at + 1) * kwh),
    dials: 5,
    multiplier: '1',
    type: 'actual',
    row: null,
  };
}

/** Moves kWh of a channel from the house's meter to another, so that both together come to the same. */
function shared(channel: ReadChannel, meter: string, kwh: number, from = 0): Change {
  let moved = 0;
  return (statement, at) => {
    if (at < from) return statement;
    const before = moved;
    moved += kwh;
    const reads = statement.reads.map((read) =>
      read.channel === channel && read.meter !== meter
        ? {
            ...read,
            previous: String(Number(read.previous) - before),
            current: String(Number(read.current) - moved),
          }
        : read,
    );
    return { ...statement, reads: [...reads, readOf(meter, channel, statement, at, kwh)] };
  };
}

const plain = (options: BuildOptions = {}) => buildHousehold({ cycles: 4, ...options });
const FILES: BuildOptions = { intervals: { channels: ['import', 'export'], minutes: 1440 } };

describe('two net meters', () => {
  const both = (facts: HouseholdFacts) =>
    eachStatement(eachStatement(facts, shared('import', 'barn', 60)), shared('export', 'barn', 20));

  test('add up: energy, bill and verdicts are those of one meter that saw it all', () => {
    const [one, two] = [cyclesOf(plain(FILES)), cyclesOf(both(plain(FILES)))];
    expect(two.map((cycle) => [cycle.energy.import?.wh, cycle.energy.export?.wh])).toEqual(
      one.map((cycle) => [cycle.energy.import?.wh, cycle.energy.export?.wh]),
    );
    expect(two.map((cycle) => cycle.oursDueCents)).toEqual(one.map((cycle) => cycle.oursDueCents));
    expect(two.map((cycle) => cycle.state)).toEqual(one.map((cycle) => cycle.state));
    expect(two.map(differing)).toEqual([[], [], [], []]);
  });

  test('are each checked by their own number', () => {
    const [, second] = cyclesOf(both(plain()));
    const keys = second?.checks
      .filter((one) => one.check === 'registersFollow' && one.verdict === 'agrees')
      .map((one) => one.key);
    expect(keys).toEqual([
      'registersFollow:import:net',
      'registersFollow:import:barn',
      'registersFollow:export:net',
      'registersFollow:export:barn',
      'registersFollow:production:prod',
    ]);
  });

  test('stand meter by meter under their sum, each with its working', () => {
    const ledger = computeLedger(both(plain()), { today: BUILT_TODAY });
    const cycle = ledger.cycles[1];
    const of = (channel: ReadChannel) => cycle?.meters.filter((one) => one.channel === channel) ?? [];
    expect(of('import').map((one) => [one.meter, one.label, one.counted])).toEqual([
      ['net', 'Net meter', true],
      ['barn', null, true],
    ]);
    expect(of('import').reduce((sum, one) => sum + one.figure.wh, 0)).toBe(cycle?.energy.import?.wh);
    expect(of('export').reduce((sum, one) => sum + one.figure.wh, 0)).toBe(cycle?.energy.export?.wh);
    expect(of('production')).toEqual([]);
    expect(everyWorking(ledger).filter((one) => !one.agrees)).toEqual([]);
  });

  test('give the channel’s energy whatever share of it the second meter saw', () => {
    const facts = plain();
    const expected = cyclesOf(facts).map((cycle) => cycle.energy.import?.wh);
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 150 }), (kwh) => {
        const cycles = cyclesOf(eachStatement(facts, shared('import', 'barn', kwh)));
        expect(cycles.map((cycle) => cycle.energy.import?.wh)).toEqual(expected);
      }),
      { numRuns: Math.ceil(PROPERTY_RUNS / 4) },
    );
  }, 120_000);

  test('one estimated and one actual leave the cycle provisional until both are read', () => {
    const estimate: Change = (statement, at) =>
      at === 3
        ? {
            ...statement,
            reads: statement.reads.map((read) => (read.meter === 'net' ? { ...read, type: 'estimated' } : read)),
          }
        : statement;
    const cycles = cyclesOf(eachStatement(both(plain()), estimate));
    expect(cycles.map((cycle) => cycle.provisional)).toEqual([false, false, false, true]);
  });
});

describe('import on one meter and export on another', () => {
  test('is one house: nothing differs and no meter is missed', () => {
    const facts = eachStatement(plain(), (statement) => ({
      ...statement,
      reads: statement.reads.map((read) => (read.channel === 'export' ? { ...read, meter: 'out' } : read)),
    }));
    expect(cyclesOf(facts).map(differing)).toEqual([[], [], [], []]);
    expect(cyclesOf(facts)[1]?.meters).toEqual([]);
  });
});

describe('a meter that is added or taken out in mid-record', () => {
  const added = eachStatement(plain(), shared('import', 'barn', 40, 2));
  const followOf = (cycle: Cycle | undefined, key: string) => cycle?.checks.find((one) => one.key === key);

  test('added: is new beside the other, which is no exchange', () => {
    const cycles = cyclesOf(added);
    expect(followOf(cycles[2], 'registersFollow:import:barn')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'Meter barn is new beside net; its reads begin here.',
    });
    expect(followOf(cycles[3], 'registersFollow:import:barn')?.verdict).toBe('agrees');
    expect(cycles.map(differing)).toEqual([[], [], [], []]);
  });

  test('taken out: is asked after once, and a bill that goes on agrees', () => {
    const facts = eachStatement(added, (statement, at) =>
      at === 3 ? { ...statement, reads: statement.reads.filter((read) => read.meter !== 'barn') } : statement,
    );
    const cycle = cyclesOf(facts)[3];
    expect(followOf(cycle, 'registersFollow:import:barn')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'Meter barn was read on the last statement and is not on this one.',
    });
  });

  test('exchanged at the end of a cycle: the new one is held to the old one’s last day', () => {
    const facts = eachStatement(plain(), (statement, at) =>
      at < 2
        ? statement
        : {
            ...statement,
            reads: statement.reads.map((read) => (read.channel === 'import' ? { ...read, meter: 'new' } : read)),
          },
    );
    const check = followOf(cyclesOf(facts)[2], 'registersFollow:import:new');
    expect([check?.verdict, check?.unit]).toEqual(['agrees', 'date']);
    expect(cyclesOf(facts)[2]?.checks.some((one) => one.key === 'registersFollow:import:net')).toBe(false);
  });
});

describe('kWh that are printed for several meters together', () => {
  test('count as printed where no register is entered', () => {
    const facts = eachStatement(plain(), (statement) => ({
      ...statement,
      reads: statement.reads.filter((read) => read.channel !== 'import'),
      importWh: wh(500_000),
    }));
    expect(cyclesOf(facts)[1]?.energy.import).toMatchObject({ wh: 500_000, from: 'printed' });
  });
});
