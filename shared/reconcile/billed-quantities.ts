import type { PrintedLine } from '../facts/papers.ts';
import type { CyclePaper } from '../ledger/cycle-papers.ts';
import type { RatePlan } from '../settlement/plan.ts';
import { type Wh, wh } from '../units/energy.ts';
import { Exact, exact, kwhOf, roundToWh } from '../units/rate.ts';
import { lastDigit } from './tolerance.ts';

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
  const printed = printedBeside(paper, channel);
  if (plan !== null) {
    for (const id of grossComponents(plan, channel)) {
      const quantities = paper.lines.flatMap((line, at) => (components[at] === id ? [quantityOf(line)] : []));
      const known = quantities.filter((quantity) => quantity !== null);
      if (known.length === 0 || known.length < quantities.length) continue;
      const sum = known.reduce((total, quantity) => total.plus(exact(quantity).abs()), new Exact(0));
      const rounded = known.reduce((total, quantity) => total.plus(lastDigit(quantity)), new Exact(0));
      // Parts that are each rounded come to the kWh beside the registers only so far.
      const same = printed !== null && kwhOf(printed).minus(sum).abs().lte(rounded);
      return same ? printed : roundToWh(sum);
    }
  }
  return printed;
}

/** The kWh of a line; null where it prints none. */
function quantityOf({ quantity, unit }: PrintedLine): string | null {
  return unit === null || unit === 'kWh' ? quantity : null;
}

/** The kWh printed beside the registers, where they are this cycle's alone. */
function printedBeside(paper: CyclePaper, channel: 'import' | 'export'): Wh | null {
  if (paper.split !== null || paper.elsewhere.apart.has(channel)) return null;
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
