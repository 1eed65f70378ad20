import { freeId, newCharge, partIds } from './new-parts.ts';
import type { ChargeForm, PlanForm } from './plan-form.ts';

type CommonKind = 'customer' | 'gross' | 'tax' | 'minimum' | 'capacity';

/** What sheets most often print, as one tick each; `is` finds the charges that are it. */
export const COMMON: { kind: CommonKind; label: string; hint?: string; is: (charge: ChargeForm) => boolean }[] = [
  { kind: 'customer', label: 'A customer charge, whatever is used', is: (charge) => charge.kind === 'fixed' },
  {
    kind: 'gross',
    label: 'A charge on every kWh bought, whatever you send out',
    hint: 'Often called public benefits or a non-bypassable charge.',
    is: (charge) => charge.kind === 'nonbypassable',
  },
  { kind: 'minimum', label: 'A minimum bill', is: (charge) => charge.kind === 'minimum' },
  {
    kind: 'capacity',
    label: 'A charge for each kW of the system',
    hint: 'Often called grid access or standby.',
    is: (charge) => charge.kind === 'demand',
  },
  { kind: 'tax', label: 'A tax or franchise fee in percent', is: (charge) => charge.kind === 'tax' },
];

export function commonCharge(kind: CommonKind, form: PlanForm): ChargeForm {
  const taken = partIds(form);
  const energy = form.charges.filter((charge) => charge.kind === 'import').map(({ id }) => id);
  const all = form.charges.map(({ id }) => id);
  switch (kind) {
    case 'customer':
      return newCharge(freeId(taken, 'customer'), 'Customer charge', 'fixed', 'cycle');
    case 'gross':
      return newCharge(freeId(taken, 'gross'), 'Public benefits', 'nonbypassable', 'import', { netting: 'none' });
    case 'minimum':
      return newCharge(freeId(taken, 'minimum'), 'Minimum bill', 'minimum', 'floor', { on: energy, per: 'cycle' });
    case 'capacity':
      return newCharge(freeId(taken, 'gridAccess'), 'Grid access', 'demand', 'kW', { kWOf: 'dc', solarOnly: true });
    case 'tax':
      return newCharge(freeId(taken, 'tax'), 'Tax', 'tax', 'percent', { on: all, afterCredits: true });
  }
}

/** Takes a charge out with every mention of it. */
export function withoutCharge(form: PlanForm, id: string): PlanForm {
  const rest = (ids: string[]) => ids.filter((one) => one !== id);
  return {
    ...form,
    charges: form.charges.filter((charge) => charge.id !== id).map((charge) => ({ ...charge, on: rest(charge.on) })),
    credits: form.credits.map((credit) => ({ ...credit, shareOf: rest(credit.shareOf) })),
    banks: form.banks.map((bank) => ({
      ...bank,
      offsets: rest(bank.offsets),
      keepMinimum: bank.keepMinimum === id ? '' : bank.keepMinimum,
      trueUps: bank.trueUps.map((trueUp) => ({ ...trueUp, shareOf: rest(trueUp.shareOf) })),
    })),
  };
}

/** A charge put before the taxes and minimums that may be worked out on it; a tax that was on every charge is on this one too. */
export function withCharge(form: PlanForm, charge: ChargeForm): ChargeForm[] {
  if (isWorkedOut(charge)) return [...form.charges, charge];
  const bare = form.charges.filter((one) => !isWorkedOut(one)).map(({ id }) => id);
  const onAll = ({ basis, on }: ChargeForm) =>
    basis === 'percent' && bare.length > 0 && bare.every((id) => on.includes(id));
  const charges = form.charges.map((one) => (onAll(one) ? { ...one, on: [...one.on, charge.id] } : one));
  const at = charges.findIndex(isWorkedOut);
  const place = at < 0 ? charges.length : at;
  return [...charges.slice(0, place), charge, ...charges.slice(place)];
}

function isWorkedOut({ basis }: ChargeForm): boolean {
  return basis === 'percent' || basis === 'floor';
}

/** Another price on each kWh is counted as the first is. */
export function likeEnergy(form: PlanForm): Partial<ChargeForm> {
  const energy = form.charges.find((charge) => charge.kind === 'import');
  return energy ? { basis: energy.basis } : {};
}
