import { sayKwh } from '../../ledger/say.ts';
import type { Charge, RatePlan } from '../../settlement/plan.ts';
import { type Edit, edit, type Place } from './edit.ts';
import { eachAndAll, sayList, withCharges, withoutKwhOffsets } from './plan-edit.ts';

/**
 * Netted import charges billed on the register as it is: each alone and all together, without what kWh banks would pay of them; and the whole plan
 * without netting, where a bank earns all that was exported. Charges with tiers and charges without are two mistakes (`tiered`). Both kinds at once
 * count to those without; the whole plan counts to those with tiers, where it has tiers at all.
 */
export function withGross({ cycle: { plan, usage }, mayDiffer }: Place, tiered: boolean): Edit[] {
  const netted = plan.charges.filter(
    (charge) => charge.basis === 'import' && (charge.netting ?? plan.netting) !== 'none',
  );
  const billedOther = netted.filter((charge) => mayDiffer(charge.id));
  const own = billedOther.filter((charge) => hasTiers(charge) === tiered);
  const sets = eachAndAll(own);
  if (!tiered && own.length > 0 && own.length < billedOther.length) sets.push(billedOther);
  const words = (charges: readonly Charge[]) => sayGross(charges, tiered, sayKwh(usage.importWh));
  const gross = sets.map((charges) => {
    const ids = charges.map((charge) => charge.id);
    const made = withCharges(withoutKwhOffsets(plan, ids), ids, (charge) => ({ ...charge, netting: 'none' }));
    return edit(ids.join(), { plan: made }, words(charges), { charges: ids.join(', ') });
  });
  if (netted.length === 0 || tiered !== netted.some(hasTiers)) return gross;
  const ids = netted.map((charge) => charge.id).join(', ');
  return [...gross, edit('plan', { plan: withoutNetting(plan) }, words(netted), { charges: ids })];
}

function hasTiers(charge: Charge): boolean {
  return charge.tiers.length > 0;
}

function sayGross(charges: readonly Charge[], tiered: boolean, kWh: string): string {
  const labels = sayList(charges.map((charge) => charge.label));
  return tiered
    ? `${labels}: the tiers were run over all ${kWh} kWh imported instead of what is left after netting.`
    : `${labels}: all ${kWh} kWh imported were billed instead of what is left after netting.`;
}

function withoutNetting(plan: RatePlan): RatePlan {
  return {
    ...plan,
    netting: 'none',
    charges: plan.charges.map((charge) => ({ ...charge, netting: null })),
    credits: plan.credits.map((credit) => ({ ...credit, netting: null })),
    banks: plan.banks.map((bank) => ({ ...bank, netting: null })),
  };
}
