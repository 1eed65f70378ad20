import type { CauseCycle, CauseId } from '#shared/reconcile/causes/cause.ts';
import type { Edit, Place } from '#shared/reconcile/causes/edit.ts';
import { flatUsage } from '#shared/reconcile/causes/flat-usage.ts';
import { HYPOTHESES } from '#shared/reconcile/causes/registry.ts';
import { billedSums } from '#shared/reconcile/causes/reproduces.ts';
import { type SettledCycle, settleCycle } from '#shared/settlement/settle.ts';
import type { CycleUsage, Opening } from '#shared/settlement/settlement.ts';
import { statementOf } from './billed-house.ts';

/** One ratio stands for all multipliers here: they differ in nothing but the number. */
const MULTIPLIER = '10';

/** A cycle with what it opens with and what it truly comes to. */
export type Given = { opening: Opening; cycle: CauseCycle; truth: SettledCycle };

/** Every way in which every mistake could be made in the cycle, whatever was billed. */
export function everyEdit({ opening, cycle, truth }: Given): { cause: CauseId; edit: Edit }[] {
  const silent = { ...cycle.billed, importWh: null, exportWh: null, productionWh: null };
  const place: Place = {
    index: 0,
    cycle: { ...cycle, usage: flatUsage(cycle.plan, opening, cycle.usage, truth), billed: silent },
    opening,
    truth,
    sums: billedSums(silent),
    differs: new Set(),
    mayDiffer: () => true,
    planBefore: null,
  };
  return HYPOTHESES.flatMap(({ cause, attempts }) =>
    attempts({ places: [place], firstOff: 0, opening }).flatMap((attempt) =>
      attempt.map((made) => ({ cause, edit: made.edit })),
    ),
  ).filter(({ edit }) => (edit.found.multiplier ?? MULTIPLIER) === MULTIPLIER);
}

/** The statement that comes of a mistake; null where it cannot be made, or changes nothing. */
export function billedWith(edit: Edit, { opening, cycle }: Given): CauseCycle['billed'] | null {
  const usage: CycleUsage = edit.usage ?? cycle.usage;
  const settled = settleCycle(edit.plan ?? cycle.plan, edit.opening ? edit.opening(opening) : opening, usage);
  if (!settled.ok) return null;
  const made = edit.after ? edit.after(settled.value) : settled.value;
  if (made === null) return null;
  const { days, banks, amountDueCents } = made.settlement;
  const settlement = { ...settled.value.settlement, days, banks, amountDueCents };
  const lines = made.settlement.lines.map((line) => ({ ...line }));
  const payouts = made.settlement.payouts.map(({ component, amountCents }) => ({ component, amountCents }));
  const statement = { ...statementOf(settlement, usage), lines, payouts };
  const money = (one: CauseCycle['billed']) =>
    JSON.stringify([
      (one.lines ?? [])
        .filter((line) => line.amountCents !== 0)
        .map(({ component, quantity, amountCents }) => [component, quantity, amountCents]),
      one.banks,
      one.payouts,
      one.amountDueCents,
    ]);
  return money(statement) === money(cycle.billed) ? null : statement;
}
