import { sayKwh } from '../../ledger/say.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { eachAndAll, sayList, withCredits } from './plan-edit.ts';

/** What is earned by production is paid on the export register (net-metering.md §4, "incentive": q = ΔP, never E). */
export const incentiveOnExport = hypothesis('incentiveOnExport', editsOf);

function editsOf({ cycle: { plan, usage }, mayDiffer }: Place): Edit[] {
  const credits = plan.credits.filter((credit) => credit.basis === 'production' && mayDiffer(credit.id));
  return eachAndAll(credits).map((some) => {
    const ids = some.map((credit) => credit.id);
    return edit(
      ids.join(),
      { plan: withCredits(plan, ids, (credit) => ({ ...credit, basis: 'export', netting: 'none' })) },
      `${sayList(some.map((credit) => credit.label))} was paid on the ${sayKwh(usage.exportWh)} kWh exported instead of on production.`,
      { credits: ids.join(', ') },
    );
  });
}
