import type { PlanBank, RatePlan } from './plan.ts';
import { creditByPeriod, isLate, type PlanFault, pricedByPeriod } from './plan-kinds.ts';
import { rateFaults, ratesOfFaults } from './rate-faults.ts';

/** A bank that cannot work: what it may pay, its periods, its lots. */
export function bankFaults(plan: RatePlan, bank: PlanBank, at: number): PlanFault[] {
  const faults: PlanFault[] = [];
  const say = (field: string, message: string) => faults.push({ path: ['banks', at, field], message });
  const netting = bank.netting ?? plan.netting;
  const { label } = bank;

  for (const id of bank.offsets) {
    const charge = plan.charges.find((other) => other.id === id);
    if (!charge) {
      say('offsets', `${label} pays ${id}, which is no charge of the plan.`);
    } else if (bank.unit === 'USD') {
      if (isLate(charge))
        say('offsets', `${label} cannot pay ${charge.label}, which is worked out only after credits.`);
    } else if (charge.basis !== 'import') {
      say('offsets', `${label} is in kWh and can lower import only, not ${charge.label}.`);
    } else if ((charge.netting ?? plan.netting) !== netting) {
      say('offsets', `${label} and ${charge.label} must have the same netting.`);
    } else if (pricedByPeriod(charge) !== bank.byPeriod) {
      say('byPeriod', `${label} and ${charge.label} must both go by period, or neither.`);
    }
  }
  if (bank.unit === 'USD' && bank.byPeriod)
    say('byPeriod', `${label} is in USD and keeps one balance, not one for each period.`);
  if (bank.unit === 'kWh' && netting === 'period' && plan.calendar.periods.length === 0) {
    say('netting', `${label} is netted by period, and the calendar has no periods.`);
  }
  if (bank.byPeriod && (netting === 'cycle' || plan.calendar.periods.length === 0)) {
    say('byPeriod', `${label} keeps a balance for each period, which needs periods and netting by them.`);
  }
  if (bank.belowZero && bank.lotLife) say('lotLife', `${label} may go below zero and so cannot be kept in lots.`);
  if (bank.ratio.startsWith('-')) say('ratio', `The ratio of ${label} cannot be below zero.`);
  if (bank.keepMinimum !== null) {
    const floor = plan.charges.find((charge) => charge.id === bank.keepMinimum);
    if (bank.unit !== 'USD' || floor?.basis !== 'floor') {
      say('keepMinimum', `${label} must keep a floor of the plan, and only a bank in USD can.`);
    }
  }
  return faults;
}

/** True-ups that do not say enough to be done. */
export function trueUpFaults(plan: RatePlan, bank: PlanBank, at: number): PlanFault[] {
  const faults: PlanFault[] = [];
  const { label } = bank;
  const averages = new Set<string>();
  for (const [index, trueUp] of bank.trueUps.entries()) {
    const path = ['banks', at, 'trueUps', index];
    const say = (field: string, message: string) => faults.push({ path: [...path, field], message });
    if (trueUp.action === 'pay') {
      if (trueUp.to === null) say('to', `The true-up of ${label} pays, and must say where to: bill or separate.`);
      if (bank.unit === 'kWh' && (trueUp.rates === null) === (trueUp.ratesOf === null)) {
        say('rates', `The true-up of ${label} pays kWh, and needs either rates or ratesOf.`);
      }
      if (bank.unit === 'kWh' && creditByPeriod(plan, trueUp) && !bank.byPeriod) {
        say('rates', `The true-up of ${label} is priced by period, and the bank keeps one balance.`);
      }
      if (trueUp.rates) faults.push(...rateFaults(plan, path, `The true-up of ${label}`, trueUp.rates, [], 'rates'));
      faults.push(...ratesOfFaults(plan, path, `The true-up of ${label}`, trueUp.ratesOf));
    }
    if (!/^\d+(\.\d{1,2})?$/.test(trueUp.fee))
      say('fee', `The fee at the true-up of ${label} must be an amount in dollars and cents.`);
    const { keep } = trueUp;
    if (keep && 'averageCycles' in keep) {
      averages.add(keep.usage);
      if (bank.unit === 'USD') say('keep', `${label} is in USD and cannot keep kWh.`);
      if (keep.usage === 'load' && plan.load === 'none')
        say('keep', `${label} keeps by the house’s use, and the plan’s load is none.`);
    } else if (keep && bank.unit === 'USD' && !/^\d+(\.\d{1,2})?$/.test(keep.amount)) {
      say('keep', `What ${label} keeps must be an amount in dollars and cents.`);
    }
  }
  if (averages.size > 1)
    faults.push({ path: ['banks', at, 'trueUps'], message: `${label} can keep by one kind of use only.` });
  return faults;
}
