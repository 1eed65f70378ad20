import type { Charge, RatePlan } from '../../settlement/plan.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { eachAndAll, sayList, withCharges, withoutKwhOffsets } from './plan-edit.ts';

/** A charge on imported kWh is billed on everything the house used (net-metering.md §4, "NBC base": q = I, not C). */
export const nonbypassableOnLoad = hypothesis('nonbypassableOnLoad', editsOf);

function editsOf({ cycle: { plan }, mayDiffer }: Place): Edit[] {
  const charges = plan.charges.filter(
    (charge) => charge.basis === 'import' && isNonbypassable(charge, plan) && mayDiffer(charge.id),
  );
  return eachAndAll(charges).map((some) => {
    const ids = some.map((charge) => charge.id);
    const load = plan.load === 'none' ? 'computed' : plan.load;
    const onLoad = withCharges({ ...withoutKwhOffsets(plan, ids), load }, ids, (charge) => ({
      ...charge,
      basis: 'load',
    }));
    return edit(
      ids.join(),
      { plan: onLoad },
      ({ settlement }) => {
        const billed = settlement.lines.filter((line) => ids.includes(line.component)).map((line) => line.quantity);
        return `${sayList(some.map((charge) => charge.label))} was billed on all ${billed[0]} kWh the house used instead of the kWh imported.`;
      },
      { charges: ids.join(', ') },
    );
  });
}

/** By its kind; or by its own netting, which keeps it from being netted as the rest is. */
function isNonbypassable(charge: Charge, plan: RatePlan): boolean {
  return charge.kind === 'nonbypassable' || (charge.netting ?? plan.netting) !== plan.netting;
}
