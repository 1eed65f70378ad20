import type { BilledBank, BilledCycle, Cause, CauseInput, TrueRead } from '#shared/reconcile/causes/cause.ts';
import { findCauses } from '#shared/reconcile/causes/find-causes.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlan, RatePlanInput } from '#shared/settlement/plan.ts';
import { type SettledCycle, settleCycle } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING, type Opening, type Settlement } from '#shared/settlement/settlement.ts';
import { cents } from '#shared/units/cents.ts';
import { type Day, day } from '#shared/units/day.ts';
import { type Wh, wh } from '#shared/units/energy.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';

/** A cycle of a built house: its plan, what the meters saw, their reads where a test needs them. */
export type BuiltCycle = { plan: RatePlan; usage: CycleUsage; reads: TrueRead[] };
export type BuiltHouse = { opening: Opening; cycles: BuiltCycle[] };

/** How a cycle was billed: what is left out is as it truly was. `after` changes what it came to. */
export type Mistake = {
  plan?: RatePlan;
  usage?: CycleUsage;
  opening?: Opening;
  after?: (settled: SettledCycle) => SettledCycle;
};

export function planOf(input: Omit<RatePlanInput, 'timeZone'>): RatePlan {
  return taken(parsePlan({ timeZone: 'America/Denver', ...input }));
}

export function kWh(amount: number): Wh {
  return wh(Math.round(amount * 1000));
}

export function usageOf(from: string, to: string, more: Partial<CycleUsage> = {}): CycleUsage {
  return {
    from: day(from),
    to: day(to),
    importWh: kWh(0),
    exportWh: kWh(0),
    productionWh: null,
    loadWh: null,
    byPeriod: null,
    netted: {},
    kW: {},
    payments: [],
    finalBill: false,
    intervals: null,
    ...more,
  };
}

export function openingOf(banks: Opening['banks']): Opening {
  return { ...EMPTY_OPENING, banks };
}

/** A register read that gives `kWh` from `previous` on, past all nines where it must. */
export function readOf(
  channel: TrueRead['channel'],
  from: Day | string,
  to: Day | string,
  previous: number,
  kWh: number,
  more: Partial<TrueRead> = {},
): TrueRead {
  const { dials = 5, multiplier = '1' } = more;
  const current = (previous + kWh / Number(multiplier)) % 10 ** dials;
  return {
    meter: 'net',
    channel,
    from: day(from),
    to: day(to),
    previous: String(previous),
    current: String(current),
    dials,
    multiplier,
    ...more,
  };
}

/** The statements of a house, billed with a mistake in some cycles; each opens with what the one before closed with. */
export function billed({ opening, cycles }: BuiltHouse, mistakes: readonly (Mistake | null)[]): BilledCycle[] {
  let held = opening;
  return cycles.map((cycle, at) => {
    const mistake = mistakes[at] ?? {};
    const usage = mistake.usage ?? cycle.usage;
    const settled = taken(settleCycle(mistake.plan ?? cycle.plan, mistake.opening ?? held, usage));
    const made = mistake.after ? mistake.after(settled) : settled;
    held = made.closing;
    return statementOf(made.settlement, usage);
  });
}

/** A settled cycle as a statement prints it. */
export function statementOf(settlement: Settlement, usage: CycleUsage): BilledCycle {
  return {
    days: settlement.days,
    reads: [],
    importWh: usage.importWh,
    exportWh: usage.exportWh,
    productionWh: usage.productionWh,
    lines: settlement.lines.map(({ component, kind, quantity, unit, amountCents }) => ({
      component,
      kind,
      quantity,
      unit,
      amountCents,
    })),
    banks: settlement.banks.map(({ bank, period, move }): BilledBank => ({ bank, period, ...move })),
    payouts: settlement.payouts.map(({ component, amountCents }) => ({ component, amountCents })),
    amountDueCents: settlement.amountDueCents,
  };
}

export function inputOf(house: BuiltHouse, statements: readonly BilledCycle[]): CauseInput {
  return {
    opening: house.opening,
    cycles: house.cycles.map((cycle, at) => {
      const statement = statements[at];
      if (!statement) throw new Error(`no statement ${at}`);
      return { ...cycle, billed: statement };
    }),
  };
}

/** What is found for a house billed with a mistake in its first cycle, or in the cycles named. */
export function causesFor(house: BuiltHouse, ...mistakes: (Mistake | null)[]): Cause[] {
  return findCauses(inputOf(house, billed(house, mistakes)));
}

/** The same with one cent more on a line of the last statement and on its total. */
export function causesACentOff(house: BuiltHouse, ...mistakes: (Mistake | null)[]): Cause[] {
  const statements = billed(house, mistakes);
  const spoilt = statements.map((statement, at) => (at === statements.length - 1 ? aCentMore(statement) : statement));
  return findCauses(inputOf(house, spoilt));
}

function aCentMore(statement: BilledCycle): BilledCycle {
  const lines = statement.lines ?? [];
  const last = lines.length - 1;
  return {
    ...statement,
    lines: lines.map((line, at) => (at === last ? { ...line, amountCents: cents(line.amountCents + 1) } : line)),
    amountDueCents: cents((statement.amountDueCents ?? 0) + 1),
  };
}

export function ids(causes: readonly Cause[]): string[] {
  return causes.map((found) => found.cause);
}
