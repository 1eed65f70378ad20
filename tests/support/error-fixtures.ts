import { readFileSync } from 'node:fs';
import type { BankShort, BilledBank, BilledCycle, CauseInput, TrueRead } from '#shared/reconcile/causes/cause.ts';
import { type Cents, cents, parseDollars } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { parseKwh, type Wh, wh } from '#shared/units/energy.ts';
import { exact } from '#shared/units/rate.ts';
import {
  type VectorInputs,
  type VectorOpening,
  type VectorResult,
  vectorOpening,
  vectorPlan,
  vectorsPath,
  vectorUsage,
} from './netmetering-adapter.ts';

type FixtureRead = {
  meter: string;
  channel: 'import' | 'export' | 'production' | 'load';
  type: 'actual' | 'estimated';
  usage: string;
};
export type FixtureStatement = VectorResult & {
  kWh?: { import?: string; export?: string; production?: string };
  reads?: FixtureRead[];
};
type BankFigures = Record<string, string | Record<string, string>>;

/** An error fixture as the file holds it (net-metering.md §3). `cause`, `overbilled` and `bankShort` are for the test to expect, never an input. */
export type ErrorFixture = {
  id: string;
  cause: string;
  plan: unknown;
  opening: VectorOpening;
  cycles: { inputs: VectorInputs; billed: FixtureStatement; expected: FixtureStatement }[];
  overbilled: string;
  bankShort: BankFigures;
};

export function readErrorFixtures(): ErrorFixture[] {
  const file = JSON.parse(readFileSync(vectorsPath('netmetering_vectors.json'), 'utf8')) as {
    errorFixtures: ErrorFixture[];
  };
  return file.errorFixtures;
}

export function fixtureInput({ plan, opening, cycles }: Pick<ErrorFixture, 'plan' | 'opening' | 'cycles'>): CauseInput {
  const parsed = vectorPlan(plan);
  return {
    opening: vectorOpening(opening),
    cycles: cycles.map(({ inputs, billed }) => ({
      plan: parsed,
      usage: vectorUsage(inputs),
      reads: (inputs.reads ?? []).map(trueRead),
      billed: billedCycle(billed),
    })),
  };
}

function trueRead(read: NonNullable<VectorInputs['reads']>[number]): TrueRead {
  const { from, to } = read as typeof read & { from: string; to: string };
  return { ...read, from: day(from), to: day(to) };
}

/** A statement of the file, billed or expected, as it is compared. */
export function billedCycle(statement: FixtureStatement): BilledCycle {
  const { days, reads, kWh, lines, banks, payouts, amountDue } = statement;
  return {
    days,
    reads: (reads ?? []).map(({ meter, channel, type, usage }) => ({ meter, channel, type, usageWh: energy(usage) })),
    importWh: kWh?.import === undefined ? null : energy(kWh.import),
    exportWh: kWh?.export === undefined ? null : energy(kWh.export),
    productionWh: kWh?.production === undefined ? null : energy(kWh.production),
    lines: lines.map(({ component, kind, quantity, unit, amount }) => ({
      component,
      kind,
      quantity,
      unit,
      amountCents: money(amount),
    })),
    banks: Object.entries(banks).flatMap(([bank, moves]) => banksOf(bank, moves)),
    payouts: payouts.map(({ component, amount }) => ({ component, amountCents: money(amount) })),
    amountDueCents: money(amountDue),
  };
}

function banksOf(bank: string, moves: VectorResult['banks'][string]): BilledBank[] {
  if (typeof moves.open === 'string') return [bankOf(bank, null, moves as Record<string, string>)];
  return Object.entries(moves as Record<string, Record<string, string>>).map(([period, move]) =>
    bankOf(bank, period, move),
  );
}

function bankOf(bank: string, period: string | null, move: Record<string, string>): BilledBank {
  const said = (name: string) => move[name] ?? null;
  return {
    bank,
    period,
    open: said('open'),
    earned: said('earned'),
    used: said('used'),
    expired: said('expired'),
    paid: said('paid'),
    close: said('close'),
  };
}

/** What banks lack, in the file's shape and by number. */
export function shortByBank(short: readonly BankShort[]): BankFigures {
  const made: BankFigures = {};
  for (const one of short) {
    const figure = exact(one.short).toString();
    if (one.period === null) made[one.bank] = figure;
    else made[one.bank] = { ...(made[one.bank] as Record<string, string> | undefined), [one.period]: figure };
  }
  return made;
}

export function numbers(figures: BankFigures): BankFigures {
  return Object.fromEntries(
    Object.entries(figures).map(([bank, figure]) => [
      bank,
      typeof figure === 'string'
        ? exact(figure).toString()
        : Object.fromEntries(Object.entries(figure).map(([period, text]) => [period, exact(text).toString()])),
    ]),
  );
}

export function money(text: string): Cents {
  const amount = parseDollars(text);
  if (amount === null) throw new Error(`not money: ${text}`);
  return cents(amount);
}

function energy(text: string): Wh {
  const amount = parseKwh(text);
  if (amount === null || !exact(text).times(1000).eq(amount)) throw new Error(`not whole Wh: ${text}`);
  return wh(amount);
}
