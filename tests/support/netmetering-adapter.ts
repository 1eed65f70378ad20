import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Problem, Result } from '#shared/problem.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { settle } from '#shared/settlement/settle.ts';
import type { CycleUsage, Flow, Opening, SettledBank, Settlement } from '#shared/settlement/settlement.ts';
import { cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { parseKwh, type Wh, wh } from '#shared/units/energy.ts';
import { Exact } from '#shared/units/rate.ts';

/** The vectors' own shape: everything is text, as in the rate plan's language. */
export type VectorFlow = { import: string; export: string };
export type VectorRead = {
  meter: string;
  channel: 'import' | 'export' | 'production' | 'load';
  previous: string;
  current: string;
  dials: number;
  multiplier: string;
};
export type VectorInputs = {
  from: string;
  to: string;
  import?: string;
  export?: string;
  production?: string;
  load?: string;
  byPeriod?: Record<string, VectorFlow>;
  netted?: Partial<Record<'15min' | 'hour', VectorFlow & { byPeriod?: Record<string, VectorFlow> }>>;
  kW?: Partial<Record<'dc' | 'ac' | 'demand', string>>;
  payments?: { date: string; amount: string }[];
  finalBill?: boolean;
  reads?: VectorRead[];
  intervals?: { start: string; minutes: number; import: string[]; export: string[]; production?: string[] };
};
export type VectorLine = {
  component: string;
  kind: string;
  period?: string;
  tier?: number;
  from?: string;
  to?: string;
  quantity: string | null;
  unit: string | null;
  rate: string | null;
  amount: string;
  inDue?: boolean;
};
export type VectorMove = Record<'open' | 'earned' | 'used' | 'expired' | 'paid' | 'close', string> & {
  lots?: { earned: string; amount: string; cyclesLeft: number }[];
};
export type VectorResult = {
  days: number;
  lines: VectorLine[];
  banks: Record<string, VectorMove | Record<string, VectorMove>>;
  payouts: VectorLine[];
  amountDue: string;
};
export type VectorOpening = {
  banks?: Opening['banks'];
  usageSinceTrueUp?: Opening['usageSinceTrueUp'];
  capUsed?: Opening['capUsed'];
  balance?: string;
};
export type Vector = {
  id: string;
  plan: unknown;
  opening: VectorOpening;
  cycles: { inputs: VectorInputs; expected: VectorResult }[];
  totals: { currentCharges: string; payouts: string };
};
export type VectorFile = {
  vectors: Vector[];
  intervalMicroCase: { inputs: VectorInputs; expected: Record<string, VectorFlow> };
  publishedExamples: {
    id: string;
    source: string;
    inputs: Record<string, unknown>;
    published: Record<string, unknown>;
  }[];
  errorFixtures: {
    id: string;
    plan: unknown;
    opening: VectorOpening;
    cycles: { inputs: VectorInputs; expected: VectorResult }[];
  }[];
};

/** Where the standards' files lie: `VECTORS_DIR`, else this project's copies. */
export function vectorsPath(name: string): string {
  return join(process.env.VECTORS_DIR ?? 'fixtures/standards', name);
}

export function readVectors(): VectorFile {
  return JSON.parse(readFileSync(vectorsPath('netmetering_vectors.json'), 'utf8')) as VectorFile;
}

/** A plan the vectors hold; throws when it is refused, since every plan in them must settle. */
export function vectorPlan(plan: unknown): RatePlan {
  return taken(parsePlan(plan));
}

export function taken<T>(result: Result<T>): T {
  if (!result.ok) throw new Error(sayProblem(result.problem));
  return result.value;
}

function sayProblem(problem: Problem): string {
  return [problem.code, problem.detail, ...problem.faults.map((fault) => fault.message)].join(': ');
}

export function vectorOpening(opening: VectorOpening): Opening {
  return {
    banks: opening.banks ?? {},
    usageSinceTrueUp: opening.usageSinceTrueUp ?? {},
    capUsed: opening.capUsed ?? {},
    balanceCents: opening.balance === undefined ? null : money(opening.balance),
  };
}

function money(text: string) {
  const amount = parseDollars(text);
  if (amount === null) throw new Error(`not money: ${text}`);
  return amount;
}

function energy(text: string): Wh {
  const amount = parseKwh(text);
  if (amount === null || !new Exact(text).times(1000).eq(amount)) throw new Error(`not whole Wh: ${text}`);
  return amount;
}

export function vectorUsage(inputs: VectorInputs): CycleUsage {
  const { intervals, reads } = inputs;
  const whole = (channel: VectorRead['channel'], given: string | undefined, steps: string[] | undefined): Wh | null => {
    if (given !== undefined) return energy(given);
    if (reads?.some((read) => read.channel === channel)) return fromReads(reads, channel);
    return steps === undefined ? null : wh(steps.map(energy).reduce<number>((sum, value) => sum + value, 0));
  };
  return {
    from: day(inputs.from),
    to: day(inputs.to),
    importWh: whole('import', inputs.import, intervals?.import) ?? wh(0),
    exportWh: whole('export', inputs.export, intervals?.export) ?? wh(0),
    productionWh: whole('production', inputs.production, intervals?.production),
    loadWh: whole('load', inputs.load, undefined),
    byPeriod: inputs.byPeriod ? mapValues(inputs.byPeriod, flow) : null,
    netted: mapValues(inputs.netted ?? {}, (given) => ({
      ...flow(given),
      byPeriod: given.byPeriod ? mapValues(given.byPeriod, flow) : null,
    })),
    kW: inputs.kW ?? {},
    payments: (inputs.payments ?? []).map(({ date, amount }) => ({ on: day(date), amountCents: money(amount) })),
    finalBill: inputs.finalBill ?? false,
    intervals: intervals
      ? {
          startUtc: intervals.start,
          minutes: intervals.minutes,
          importWh: intervals.import.map(energy),
          exportWh: intervals.export.map(energy),
          productionWh: (intervals.production ?? []).map(energy),
        }
      : null,
  };
}

/** ((current − previous) mod 10^dials) × multiplier, summed over meters (rate-plan.md, order in a cycle, 1). */
function fromReads(reads: readonly VectorRead[], channel: string): Wh {
  let sum = new Exact(0);
  for (const read of reads) {
    if (read.channel !== channel) continue;
    const turn = new Exact(10).pow(read.dials);
    const difference = new Exact(read.current).minus(read.previous);
    sum = sum.plus((difference.lt(0) ? difference.plus(turn) : difference).times(read.multiplier));
  }
  return energy(sum.toString());
}

function flow(given: VectorFlow): Flow {
  return { importWh: energy(given.import), exportWh: energy(given.export) };
}

function mapValues<K extends string, A, B>(from: Partial<Record<K, A>>, make: (value: A) => B): Record<K, B> {
  return Object.fromEntries(Object.entries(from).map(([key, value]) => [key, make(value as A)])) as Record<K, B>;
}

export function settleVector(vector: Pick<Vector, 'plan' | 'opening' | 'cycles'>): Settlement[] {
  const usages = vector.cycles.map((cycle) => vectorUsage(cycle.inputs));
  return taken(settle(vectorPlan(vector.plan), vectorOpening(vector.opening), usages)).settlements;
}

/** Two texts that are the same number, or two nulls, become the same text. */
function number(text: string | null): string | null {
  return text === null ? null : new Exact(text).toString();
}

/** A line brought to what is compared: numbers as numbers, no label, nothing where there is nothing. */
function comparable(line: VectorLine) {
  return {
    component: line.component,
    kind: line.kind,
    period: line.period ?? null,
    tier: line.tier ?? null,
    from: line.from ?? null,
    to: line.to ?? null,
    quantity: number(line.quantity),
    unit: line.unit,
    rate: number(line.rate),
    amount: number(line.amount),
    inDue: line.inDue ?? null,
  };
}

function comparableMove(move: VectorMove) {
  const { lots, ...rest } = move;
  return {
    ...mapValues(rest, number),
    lots: lots?.map((lot) => ({ ...lot, amount: number(lot.amount) })) ?? null,
  };
}

type Bank = VectorMove | Record<string, VectorMove>;

function isMove(bank: Bank): bank is VectorMove {
  return typeof bank.open === 'string';
}

/** A result as the vectors print it, ready to be compared. */
export function comparableExpected(expected: VectorResult) {
  return {
    days: expected.days,
    lines: expected.lines.map(comparable),
    banks: mapValues(expected.banks, (bank: Bank) =>
      isMove(bank) ? comparableMove(bank) : mapValues(bank, comparableMove),
    ),
    payouts: expected.payouts.map(comparable),
    amountDue: number(expected.amountDue),
  };
}

/** Our settlement in the same form. */
export function comparableSettlement(settlement: Settlement) {
  const banks: VectorResult['banks'] = {};
  for (const bank of settlement.banks) {
    const move = vectorMove(bank);
    if (bank.period === null) banks[bank.bank] = move;
    else banks[bank.bank] = { ...(banks[bank.bank] as Record<string, VectorMove> | undefined), [bank.period]: move };
  }
  return comparableExpected({
    days: settlement.days,
    lines: settlement.lines.map(({ amountCents, period, tier, from, to, ...line }) => ({
      ...line,
      ...(period === null ? {} : { period }),
      ...(tier === null ? {} : { tier }),
      ...(from === null ? {} : { from }),
      ...(to === null ? {} : { to }),
      amount: dollarsText(amountCents),
    })),
    banks,
    payouts: settlement.payouts.map(({ amountCents, ...payout }) => ({ ...payout, amount: dollarsText(amountCents) })),
    amountDue: dollarsText(settlement.amountDueCents),
  });
}

function vectorMove(bank: SettledBank): VectorMove {
  return bank.lots ? { ...bank.move, lots: bank.lots } : bank.move;
}

/** Current charges (lines in due without previous balances and payments) and payouts over all cycles, as numbers. */
export function totalsOf(settlements: readonly Settlement[]): {
  currentCharges: string | null;
  payouts: string | null;
} {
  let current = 0;
  let payouts = 0;
  for (const settlement of settlements) {
    for (const line of settlement.lines) {
      if (line.inDue && line.kind !== 'previousBalance' && line.kind !== 'payment') current += line.amountCents;
    }
    for (const payout of settlement.payouts) payouts += payout.amountCents;
  }
  return { currentCharges: number(dollarsText(cents(current))), payouts: number(dollarsText(cents(payouts))) };
}
