import type { PlanBank, RatePlan } from '#shared/settlement/plan.ts';
import type { SettledAmounts } from '#shared/settlement/settle.ts';
import type { CycleUsage } from '#shared/settlement/settlement.ts';
import { Exact, exact } from '#shared/units/rate.ts';

type Line = SettledAmounts['settlement']['lines'][number];
type Flow = { import: number; export: number };

/** A bank as its own moves say: nothing comes from nowhere, nothing is lost, and it opens with what it closed with. Throws where not. */
export function banksConserve(settled: readonly SettledAmounts[]): void {
  const held = new Map<string, string>();
  for (const { settlement } of settled) {
    for (const { bank, period, move, lots } of settlement.banks) {
      const name = `${bank} ${period}`;
      const came = exact(move.open).plus(exact(move.earned));
      const went = exact(move.used).plus(exact(move.expired)).plus(exact(move.paid));
      const opens = exact(move.open).eq(exact(held.get(name) ?? '0'));
      if (!opens || !came.eq(went.plus(exact(move.close)))) throw new Error(`${name}: ${JSON.stringify(move)}`);
      const inLots = lots?.reduce((sum, lot) => sum.plus(exact(lot.amount)), new Exact(0));
      if (inLots && !inLots.eq(exact(move.close))) throw new Error(`${name}: its lots come to ${inLots}`);
      held.set(name, move.close);
    }
  }
}

/** A USD bank as the lines of the bills and what is paid apart say, apart from its own moves: credits in; what it pays and its true-ups out. */
export function dollarsConserve(plan: RatePlan, settled: readonly SettledAmounts[]): void {
  for (const bank of plan.banks.filter(({ unit }) => unit === 'USD')) {
    const credits = plan.credits.filter(({ to }) => to === bank.id).map(({ id }) => id);
    let owed = new Exact(0);
    for (const { settlement } of settled) {
      const move = moveOf(settlement.banks, bank.id);
      const earned = dollars(settlement.lines, (line) => credits.includes(line.component)).neg();
      const used = bank.belowZero
        ? dollars(settlement.lines, (line) => bank.offsets.includes(line.component))
        : dollars(settlement.lines, (line) => line.component === bank.id && line.kind === 'credit').neg();
      const trueUp = (line: { component: string; kind: string; label: string }) =>
        line.component === bank.id && line.kind === 'trueup' && !line.label.endsWith('fee');
      const paid = dollars(settlement.payouts, trueUp).minus(dollars(settlement.lines, trueUp));
      owed = owed.plus(earned).minus(used).minus(paid).minus(move.expired);
      if (!earned.eq(move.earned) || !used.eq(move.used) || !paid.eq(move.paid) || !owed.eq(move.close))
        throw new Error(`${bank.id}: ${owed} is owed by the lines, the bank says ${JSON.stringify(move)}`);
    }
  }
}

/**
 * A kWh bank as the meters and the lines say: it earns its ratio of what is left to send out, and what it pays is what its charges leave out of the
 * import. Kept or shared in whole kWh, a move may lie half a kWh off for each of its parts.
 */
export function kWhConserve(plan: RatePlan, cycles: readonly CycleUsage[], settled: readonly SettledAmounts[]): void {
  for (const bank of plan.banks.filter(({ unit }) => unit === 'kWh')) {
    settled.forEach(({ settlement }, at) => {
      const usage = cycles[at];
      if (!usage) throw new Error('a settlement without its cycle');
      const flow = netted(usage, bank.netting ?? plan.netting);
      const move = moveOf(settlement.banks, bank.id);
      expectNear(bank, 'earned', move.earned, exact(bank.ratio).times(flow.export).div(1000), plan, 2);
      for (const id of bank.offsets) {
        const lines = settlement.lines.filter((line) => line.component === id);
        const billed = lines.reduce((sum, line) => sum.plus(exact(line.quantity ?? '0')), new Exact(0));
        expectNear(bank, 'used', move.used, new Exact(flow.import).div(1000).minus(billed), plan, lines.length);
      }
    });
  }
}

function expectNear(bank: PlanBank, what: string, has: Exact, expected: Exact, plan: RatePlan, parts: number): void {
  // Shares of days are printed to some places; whole kWh are rounded.
  const most = new Exact(plan.rounding.kWh === 'whole' ? '0.5' : '0.000001').times(parts);
  if (has.minus(expected).abs().gt(most)) throw new Error(`${bank.id} ${what} ${has}, by the meters ${expected}`);
}

/** The rounded lines in due come to the amount due, and it is the next cycle's previous balance. */
export function centsConserve(settled: readonly SettledAmounts[]): void {
  let due = 0;
  for (const { settlement, closing } of settled) {
    let sum = 0;
    for (const line of settlement.lines) if (line.inDue) sum += line.amountCents;
    const brought = settlement.lines.find((line) => line.kind === 'previousBalance')?.amountCents;
    if (brought !== due) throw new Error(`${brought} is brought in, ${due} was due`);
    due = settlement.amountDueCents;
    if (sum !== due || closing.balanceCents !== due) throw new Error(`the lines in due come to ${sum}, due is ${due}`);
  }
}

function dollars<Of extends Pick<Line, 'amountCents'>>(lines: readonly Of[], which: (line: Of) => boolean): Exact {
  return new Exact(lines.reduce((total, line) => (which(line) ? total + line.amountCents : total), 0)).div(100);
}

/** A bank's moves, its periods added up. */
function moveOf(banks: SettledAmounts['settlement']['banks'], id: string) {
  const own = banks.filter((one) => one.bank === id);
  if (own.length === 0) throw new Error(`${id} is not in the settlement`);
  const sum = (of: 'earned' | 'used' | 'expired' | 'paid' | 'close') =>
    own.reduce((total, { move }) => total.plus(exact(move[of])), new Exact(0));
  return { earned: sum('earned'), used: sum('used'), expired: sum('expired'), paid: sum('paid'), close: sum('close') };
}

/** Import and export in Wh after netting, by hand: from the totals given, or in a bare loop over the steps of quarter-hours. */
function netted(usage: CycleUsage, netting: RatePlan['netting']): Flow {
  const { importWh, exportWh, byPeriod, intervals } = usage;
  switch (netting) {
    case 'none':
      return { import: importWh, export: exportWh };
    case 'cycle':
      return apart(importWh - exportWh);
    case 'period':
      return Object.values(byPeriod ?? {})
        .map((one) => apart(one.importWh - one.exportWh))
        .reduce(both);
    default: {
      const given = usage.netted[netting];
      if (given) return { import: given.importWh, export: given.exportWh };
      const nets: number[] = [];
      const steps = netting === 'hour' ? 4 : 1;
      intervals?.importWh.forEach((value, at) => {
        const block = Math.floor(at / steps);
        nets[block] = (nets[block] ?? 0) + value - (intervals.exportWh[at] ?? 0);
      });
      return nets.map(apart).reduce(both);
    }
  }
}

function apart(net: number): Flow {
  return { import: Math.max(net, 0), export: Math.max(-net, 0) };
}

function both(a: Flow, b: Flow): Flow {
  return { import: a.import + b.import, export: a.export + b.export };
}
