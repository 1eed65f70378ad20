import type { ChargeForm, PlanForm } from './plan-form.ts';

/** Whether a minimum is met before the taxes, which are then on it too, or by a bill that holds them already. Null where taxes differ in it. */
export type MinimumTax = 'before' | 'after' | null;

export function minimumTaxOf(form: PlanForm, floor: ChargeForm): MinimumTax {
  const taxes = taxesOn(form, floor);
  const place = form.charges.indexOf(floor);
  if (taxes.every((tax) => tax.on.includes(floor.id) && form.charges.indexOf(tax) > place)) return 'before';
  return taxes.every((tax) => floor.on.includes(tax.id) && form.charges.indexOf(tax) < place) ? 'after' : null;
}

/** The percentages that share a charge with a minimum, or are worked out on it. */
export function taxesOn(form: PlanForm, floor: ChargeForm): ChargeForm[] {
  return form.charges.filter(
    ({ basis, on }) => basis === 'percent' && (on.includes(floor.id) || on.some((id) => floor.on.includes(id))),
  );
}

/**
 * The charges with a minimum met before its taxes (they follow it, and are on it) or after them (it follows them, and they count towards it). What
 * comes only with the minimum can be worked out only after credits.
 */
export function withMinimumTax(form: PlanForm, floor: ChargeForm, tax: 'before' | 'after'): ChargeForm[] {
  const taxes = taxesOn(form, floor).map(({ id }) => id);
  const bare = floor.on.filter((id) => !taxes.includes(id));
  const made: ChargeForm = { ...floor, on: tax === 'after' ? [...bare, ...taxes] : bare };
  const others = form.charges
    .filter(({ id }) => id !== floor.id)
    .map((charge) => {
      if (!taxes.includes(charge.id)) return charge;
      const on = charge.on.filter((id) => id !== floor.id);
      return tax === 'before' ? { ...charge, on: [...on, floor.id], afterCredits: true } : { ...charge, on };
    });
  const places = others.flatMap(({ id }, at) => (taxes.includes(id) ? [at] : []));
  const place = tax === 'before' ? Math.min(...places) : Math.max(...places) + 1;
  const held = places.length === 0 ? form.charges.indexOf(floor) : place;
  return [...others.slice(0, held), made, ...others.slice(held)];
}
