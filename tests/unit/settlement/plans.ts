import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlan, RatePlanInput } from '#shared/settlement/plan.ts';
import { type SettledCycle, settleCycle } from '#shared/settlement/settle.ts';
import {
  type CycleUsage,
  EMPTY_OPENING,
  type Opening,
  type SettledLine,
  type Settlement,
} from '#shared/settlement/settlement.ts';
import { dollarsText, sumCents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { exact, usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';

/** A flat price of energy, per kWh, from the start of 2025. */
export const FLAT = [{ from: '2025-01-01', rate: '0.10' }];

export const ENERGY = { id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates: FLAT } as const;
export const CUSTOMER = {
  id: 'customer',
  label: 'Customer charge',
  kind: 'fixed',
  basis: 'cycle',
  rates: [{ from: '2025-01-01', rate: '12.00' }],
} as const;

export const TWO_SEASONS = [
  { id: 'summer', from: '06-01', to: '09-30' },
  { id: 'winter', from: '10-01', to: '05-31' },
];

/** What a plan input may be before it is read; a test may also write what no plan can say. */
export type Loose = Partial<Record<keyof RatePlanInput, unknown>>;

export function planInput(part: Loose = {}): Loose {
  return { timeZone: 'America/Denver', netting: 'none', charges: [ENERGY], ...part };
}

export function plan(part: Loose = {}): RatePlan {
  return taken(parsePlan(planInput(part)));
}

/** A cycle of 30 days, 2026-06-16 to 2026-07-16, unless said otherwise; energies in kWh. */
export function usage(
  part: Omit<Partial<CycleUsage>, 'from' | 'to'> & {
    from?: string;
    to?: string;
    import?: number;
    export?: number;
    production?: number;
  } = {},
): CycleUsage {
  const { import: bought = 0, export: sent = 0, production, from = '2026-06-16', to = '2026-07-16', ...rest } = part;
  return {
    importWh: wh(Math.round(bought * 1000)),
    exportWh: wh(Math.round(sent * 1000)),
    productionWh: production === undefined ? null : wh(Math.round(production * 1000)),
    loadWh: null,
    byPeriod: null,
    netted: {},
    kW: {},
    payments: [],
    finalBill: false,
    intervals: null,
    ...rest,
    from: day(from),
    to: day(to),
  };
}

export function opening(part: Partial<Opening> = {}): Opening {
  return { ...EMPTY_OPENING, ...part };
}

/** Settles a cycle, and makes sure that every working gives its own figure and every bank adds up. */
export function settled(of: RatePlan, used: CycleUsage, from: Opening = EMPTY_OPENING): SettledCycle {
  const result = taken(settleCycle(of, from, used));
  mustHold(result.settlement);
  return result;
}

/** Throws unless every working evaluates to its figure, each bank's close is what its moves say, and the lines in due are the amount due. */
export function mustHold(settlement: Settlement): void {
  for (const figure of [...settlement.lines, ...settlement.payouts]) {
    const found = evaluateWorking(figure.working);
    if (!found.eq(usdOf(figure.amountCents))) {
      throw new Error(
        `${figure.component}: ${figure.working.formula} gives ${found}, the figure is ${dollarsText(figure.amountCents)}`,
      );
    }
  }
  for (const { bank: id, move } of settlement.banks) {
    const [open, earned, used, expired, paid, close] = [
      move.open,
      move.earned,
      move.used,
      move.expired,
      move.paid,
      move.close,
    ].map(exact);
    const moved = open
      ?.plus(earned ?? 0)
      .minus(used ?? 0)
      .minus(expired ?? 0)
      .minus(paid ?? 0);
    if (!close || !moved?.eq(close)) throw new Error(`${id}: ${JSON.stringify(move)} does not add up`);
  }
  const due = sumCents(settlement.lines.filter((line) => line.inDue).map((line) => line.amountCents));
  if (due !== settlement.amountDueCents)
    throw new Error(`lines in due come to ${due}, due is ${settlement.amountDueCents}`);
}

/** Why a settlement is refused. */
export function refusal(of: RatePlan, used: CycleUsage, from: Opening = EMPTY_OPENING): string {
  const result = settleCycle(of, from, used);
  if (result.ok) throw new Error('it was settled');
  return result.problem.detail ?? '';
}

/** Lines as short texts: "energy 15 kWh at 0.10 = 1.50". */
export function said(lines: readonly SettledLine[]): string[] {
  return lines.map((line) => {
    const of = [
      line.period,
      line.tier === null ? null : `tier ${line.tier}`,
      line.from === null ? null : `${line.from}..${line.to}`,
    ];
    const name = [line.component, ...of.filter((word) => word !== null)].join(' ');
    const quantity = line.quantity === null ? '' : ` ${line.quantity} ${line.unit} at ${line.rate}`;
    return `${name}${quantity} = ${dollarsText(line.amountCents)}${line.inDue ? '' : ' (not in due)'}`;
  });
}

export function bank(result: SettledCycle, id: string, period: string | null = null) {
  const found = result.settlement.banks.find((one) => one.bank === id && one.period === period);
  if (!found) throw new Error(`no bank ${id}`);
  return found;
}
