import { bankFaults, trueUpFaults } from './bank-faults.ts';
import type { Charge, Credit, RatePlan } from './plan.ts';
import { creditByPeriod, isEnergy, isLate, type PlanFault, pricedByPeriod } from './plan-kinds.ts';
import { rateFaults, ratesOfFaults, tierFaults } from './rate-faults.ts';

/** Everything that refuses a plan whatever the cycle: unknown ids, rules that contradict each other, days without a rate. */
export function planFaults(plan: RatePlan): PlanFault[] {
  return [
    ...nameFaults(plan),
    ...plan.charges.flatMap((charge, at) => chargeFaults(plan, charge, at)),
    ...plan.credits.flatMap((credit, at) => creditFaults(plan, credit, at)),
    ...plan.banks.flatMap((bank, at) => [...bankFaults(plan, bank, at), ...trueUpFaults(plan, bank, at)]),
  ];
}

const timeZones = new Set<string>();

/** Names found good are remembered: making a formatter is slow, and a projection makes ready a plan for every year. */
function isTimeZone(name: string): boolean {
  if (timeZones.has(name)) return true;
  try {
    new Intl.DateTimeFormat('en-US', { timeZone: name });
  } catch {
    return false;
  }
  timeZones.add(name);
  return true;
}

function nameFaults(plan: RatePlan): PlanFault[] {
  const faults: PlanFault[] = [];
  const once = (path: string, ids: readonly string[]) => {
    for (const [at, id] of ids.entries()) {
      if (ids.indexOf(id) < at)
        faults.push({ path: [path, at], message: `The id ${id} is used twice; every id must be its own.` });
    }
  };
  once(
    'charges',
    [...plan.charges, ...plan.credits, ...plan.banks].map((item) => item.id),
  );
  once(
    'calendar.seasons',
    plan.calendar.seasons.map((season) => season.id),
  );
  once(
    'calendar.periods',
    plan.calendar.periods.map((period) => period.id),
  );
  if (!isTimeZone(plan.timeZone)) {
    faults.push({
      path: ['timeZone'],
      message: `${plan.timeZone} is not the name of a time zone; use one such as America/Denver.`,
    });
  }
  const seasons = new Set(plan.calendar.seasons.map((season) => season.id));
  for (const [at, period] of plan.calendar.periods.entries()) {
    if (period.when === 'rest') continue;
    for (const span of period.when) {
      const path = ['calendar', 'periods', at, 'when'];
      if (span.season !== undefined && !seasons.has(span.season)) {
        faults.push({
          path,
          message: `The period ${period.id} names the season ${span.season}, which the calendar does not have.`,
        });
      }
      if (span.from >= span.to) {
        faults.push({
          path,
          message: `The hours ${span.from} to ${span.to} of ${period.id} must run forward; split them at midnight.`,
        });
      }
    }
  }
  return faults;
}

function chargeFaults(plan: RatePlan, charge: Charge, at: number): PlanFault[] {
  const path = ['charges', at];
  const faults: PlanFault[] = [];
  const say = (field: string, message: string) => faults.push({ path: [...path, field], message });
  const netting = charge.netting ?? plan.netting;
  const { label, basis } = charge;

  if (basis === 'load' && plan.load === 'none')
    say('basis', `${label} is charged on the house’s use, and the plan’s load is none.`);
  if (basis === 'kW' && charge.kWOf === null)
    say('kWOf', `${label} must say of what it counts the kW: dc, ac or demand.`);
  if (basis === 'floor' && charge.per === null)
    say('per', `${label} must say whether its floor is per cycle or per day.`);
  if ((basis === 'percent' || basis === 'floor') && charge.on.length === 0)
    say('on', `${label} must say on which lines it is worked out.`);
  if ((basis === 'import' || basis === 'export') && pricedByPeriod(charge) && netting === 'cycle') {
    say('netting', `${label} is priced by period, which netting over the whole cycle does not leave.`);
  }
  if ((basis === 'import' || basis === 'export') && netting === 'period' && plan.calendar.periods.length === 0) {
    say('netting', `${label} is netted by period, and the calendar has no periods.`);
  }
  if (!isEnergy(charge) && charge.rates.some((row) => row.period !== undefined || row.tier !== undefined)) {
    say('rates', `${label} is not charged by the kWh and cannot have rates by period or tier.`);
  }
  for (const id of charge.on) {
    const before = plan.charges.findIndex((other) => other.id === id);
    const other = plan.charges[before];
    if (!other) say('on', `${label} is worked out on ${id}, which is no charge of the plan.`);
    else if (before >= at || (isLate(other) && !isLate(charge))) {
      say('on', `${label} is worked out on ${other.label}, which comes only after it.`);
    }
  }
  return [
    ...faults,
    ...rateFaults(plan, path, label, charge.rates, charge.tiers, 'rates'),
    ...tierFaults(plan, path, charge),
  ];
}

function creditFaults(plan: RatePlan, credit: Credit, at: number): PlanFault[] {
  const path = ['credits', at];
  const faults: PlanFault[] = [];
  const say = (field: string, message: string) => faults.push({ path: [...path, field], message });
  const netting = credit.netting ?? plan.netting;
  const { label } = credit;

  if ((credit.rates === null) === (credit.ratesOf === null))
    say('rates', `${label} needs either rates or ratesOf, one of the two.`);
  if (credit.to !== 'bill' && credit.to !== 'separate') {
    const bank = plan.banks.find(({ id }) => id === credit.to);
    if (!bank) say('to', `${label} goes to ${credit.to}, which is no bank of the plan.`);
    else if (bank.unit !== 'USD') say('to', `${label} is money and cannot go to ${bank.label}, a bank in kWh.`);
  }
  if (credit.basis === 'export' && netting === 'cycle' && creditByPeriod(plan, credit)) {
    say('netting', `${label} is priced by period, which netting over the whole cycle does not leave.`);
  }
  if (credit.basis === 'export' && netting === 'period' && plan.calendar.periods.length === 0) {
    say('netting', `${label} is netted by period, and the calendar has no periods.`);
  }
  if (credit.term && credit.term.lastDay < credit.term.firstDay)
    say('term', `The term of ${label} ends before it begins.`);
  if (credit.cap && !/^\d+(\.\d{1,2})?$/.test(credit.cap.amount))
    say('cap', `The cap of ${label} must be an amount in dollars and cents.`);
  if (credit.rates) faults.push(...rateFaults(plan, path, label, credit.rates, [], 'rates'));
  return [...faults, ...ratesOfFaults(plan, path, label, credit.ratesOf)];
}
