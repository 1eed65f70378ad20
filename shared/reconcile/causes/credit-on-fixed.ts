import type { Charge, PlanBank, RatePlan } from '../../settlement/plan.ts';
import { isLate } from '../../settlement/plan-kinds.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { eachAndAll, sayList, withBank, withCharges } from './plan-edit.ts';

/** A bank pays charges that it may not pay, or down below the least the bill must come to (net-metering.md §4, "scope": credit ≤ allowed lines; minimum honoured). */
export const creditOnFixed = hypothesis('creditOnFixed', ({ cycle: { plan }, mayDiffer }: Place) =>
  plan.banks.flatMap((bank) => [...paysMore(plan, bank, mayDiffer), ...underMinimum(plan, bank)]),
);

/** What dollars pay shows in the line of the bank; what kWh pay, in the lines of the charges. */
function paysMore(plan: RatePlan, bank: PlanBank, mayDiffer: Place['mayDiffer']): Edit[] {
  const others = plan.charges.filter(
    (charge) =>
      !bank.offsets.includes(charge.id) && canPay(charge, bank) && mayDiffer(bank.unit === 'USD' ? bank.id : charge.id),
  );
  return eachAndAll(others).map((charges) => {
    const ids = charges.map((charge) => charge.id);
    const offsets = [...bank.offsets, ...ids];
    const netting = bank.netting ?? plan.netting;
    const paying = withBank(plan, bank.id, (one) => ({ ...one, offsets }));
    return edit(
      `${bank.id}:${ids.join()}`,
      { plan: bank.unit === 'kWh' ? withCharges(paying, ids, (charge) => ({ ...charge, netting })) : paying },
      `${bank.label} was also used to pay ${sayList(charges.map((charge) => charge.label))}, which it may not.`,
      { bank: bank.id, charges: ids.join(', ') },
    );
  });
}

/** Dollars can pay any line worked out before credits; kWh only import. */
function canPay(charge: Charge, bank: PlanBank): boolean {
  return bank.unit === 'USD' ? !isLate(charge) : charge.basis === 'import';
}

function underMinimum(plan: RatePlan, bank: PlanBank): Edit[] {
  if (bank.keepMinimum === null) return [];
  const label = plan.charges.filter((charge) => charge.id === bank.keepMinimum).map((charge) => charge.label);
  return [
    edit(
      `${bank.id}:minimum`,
      { plan: withBank(plan, bank.id, (one) => ({ ...one, keepMinimum: null })) },
      `${bank.label} was spent below ${sayList(label)}.`,
      { bank: bank.id, charges: bank.keepMinimum },
    ),
  ];
}
