import type { CyclePaper } from '../ledger/cycle-papers.ts';
import type { RatePlan } from '../settlement/plan.ts';
import { plus, type Qty, qtyOfText, sizeOf, whOfQty } from '../settlement/quantity.ts';
import { type Wh, wh } from '../units/energy.ts';

/**
 * The kWh the statement charges or credits for a channel: the quantity of the lines of the first component of the plan that takes the register as it is
 * (no netting, no kWh bank in front of it); else the kWh printed beside the registers; else null, where only the reads say anything.
 */
export function billedQuantity(
  paper: CyclePaper,
  channel: 'import' | 'export',
  plan: RatePlan | null,
  components: readonly (string | null)[],
): Wh | null {
  if (plan !== null) {
    for (const id of grossComponents(plan, channel)) {
      let sum: Qty = 0;
      let found = false;
      let complete = true;
      for (let at = 0; at < paper.lines.length; at += 1) {
        const line = paper.lines[at];
        if (!line || components[at] !== id) continue;
        if (line.quantity === null || (line.unit !== null && line.unit !== 'kWh')) complete = false;
        else sum = plus(sum, sizeOf(qtyOfText(line.quantity)));
        found = true;
      }
      if (found && complete) return whOfQty(sum);
    }
  }
  if (paper.split !== null) return null;
  const printed = channel === 'import' ? paper.statement.importWh : paper.statement.exportWh;
  return printed === null ? null : wh(Math.abs(printed));
}

const known = new WeakMap<RatePlan, Record<'import' | 'export', readonly string[]>>();

/** Looked up once per plan object; a plan is never changed in place. */
function grossComponents(plan: RatePlan, channel: 'import' | 'export'): readonly string[] {
  const made = known.get(plan) ?? { import: listGross(plan, 'import'), export: listGross(plan, 'export') };
  known.set(plan, made);
  return made[channel];
}

function listGross(plan: RatePlan, channel: 'import' | 'export'): string[] {
  const banked = new Set(plan.banks.filter((bank) => bank.unit === 'kWh').flatMap((bank) => bank.offsets));
  const gross = (item: { id: string; basis: string; netting: string | null }) =>
    item.basis === channel && (item.netting ?? plan.netting) === 'none' && !banked.has(item.id);
  return [...plan.charges.filter(gross), ...plan.credits.filter((c) => gross(c) && c.term === null)].map((c) => c.id);
}
