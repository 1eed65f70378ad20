import { sayGap } from '../../ledger/say.ts';
import type { CycleUsage } from '../../settlement/settlement.ts';
import { kwhText, type Wh, wh } from '../../units/energy.ts';
import { Exact, roundToWh } from '../../units/rate.ts';
import type { BilledLine } from './cause.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';

/**
 * The export billed is not what the meter saw leave, and every price is right: the quantity is taken from the statement. It says what differs and not
 * why, so it is a last resort. The kWh printed beside the register may be the right ones all the same.
 */
export const exportShort = hypothesis('exportShort', editsOf, { kWh: true });

function editsOf({ cycle: { plan, usage, billed } }: Place): Edit[] {
  const edits: Edit[] = [];
  if (billed.exportWh !== null) edits.push(...otherExport(usage, billed.exportWh));
  for (const credit of plan.credits) {
    const netting = credit.netting ?? plan.netting;
    const billedWh = credit.basis === 'export' ? quantityOf(billed.lines ?? [], credit.id) : null;
    if (billedWh === null) continue;
    if (netting === 'none') edits.push(...otherExport(usage, billedWh));
    if (netting === 'hour' || netting === '15min') edits.push(...otherNetted(usage, netting, billedWh));
  }
  return edits;
}

function otherExport(usage: CycleUsage, billedWh: Wh): Edit[] {
  return otherQuantity(usage.exportWh, billedWh, { ...usage, exportWh: billedWh });
}

function otherNetted(usage: CycleUsage, netting: 'hour' | '15min', billedWh: Wh): Edit[] {
  const flow = usage.netted[netting];
  if (!flow) return [];
  const netted = { ...usage.netted, [netting]: { ...flow, exportWh: billedWh } };
  return otherQuantity(flow.exportWh, billedWh, { ...usage, netted });
}

function otherQuantity(wasWh: Wh, billedWh: Wh, usage: CycleUsage): Edit[] {
  if (billedWh === wasWh) return [];
  const gap = sayGap(wh(billedWh - wasWh));
  const words = `It credits ${gap} kWh ${billedWh < wasWh ? 'less' : 'more'} than your meter saw leave.`;
  return [edit('export', { usage }, words, { billedKwh: kwhText(billedWh), meteredKwh: kwhText(wasWh) })];
}

/** The kWh of a credit as printed, of either sign; null where they are not printed. */
function quantityOf(lines: readonly BilledLine[], id: string): Wh | null {
  let sum: Exact | null = null;
  for (const line of lines) {
    if (line.component !== id || line.quantity === null || line.unit !== 'kWh') continue;
    sum = new Exact(line.quantity).abs().plus(sum ?? 0);
  }
  return sum === null ? null : roundToWh(sum);
}
