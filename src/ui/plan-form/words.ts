import type { ChangeBy, Charge, Netting } from '#shared/settlement/plan.ts';
import type { ChargeForm } from './plan-form.ts';

export const KIND_WORDS: Record<Charge['kind'], string> = {
  import: 'Energy',
  nonbypassable: 'A charge that what you send out never reduces',
  fixed: 'A fixed charge',
  demand: 'A charge by the kW',
  tax: 'A tax or fee in percent',
  minimum: 'A minimum bill',
  adjustment: 'A rider or adjustment',
};

export const BASIS_WORDS: Record<Charge['basis'], string> = {
  import: 'each kWh you buy',
  export: 'each kWh you send out',
  production: 'each kWh the roof makes',
  load: 'each kWh the house uses',
  cycle: 'each bill',
  day: 'each day',
  kW: 'each kW',
  percent: 'other charges, in percent',
  floor: 'what other charges fall short of a least amount',
};

export const NETTING_WORDS: Record<Netting, string> = {
  none: 'not at all: both meters count as they are',
  '15min': 'within each quarter of an hour',
  hour: 'within each hour',
  period: 'within each time-of-use period of the month',
  cycle: 'over the whole month',
};

export const CHANGE_WORDS: Record<ChangeBy, string> = {
  days: 'the cycle is shared by days, old price and new',
  readDate: 'the price on the day of the read holds for all of it',
  intervals: 'each hour is priced at its own time',
};

/** "each kWh you buy, by season and time of day" */
export function chargeWords(charge: ChargeForm): string {
  const by = [
    charge.bySeason ? 'season' : null,
    charge.byPeriod ? 'time of day' : null,
    charge.tiers.length > 0 ? 'tier' : null,
  ].filter((word) => word !== null);
  const basis =
    charge.basis === 'floor'
      ? charge.per === 'day'
        ? 'topped up to a least amount a day'
        : 'topped up to a least amount'
      : `on ${BASIS_WORDS[charge.basis]}`;
  return by.length === 0 ? basis : `${basis}, by ${by.join(' and ')}`;
}

/** "16:00" as people say it: "4 pm". */
export function hourWords(clock: string): string {
  if (clock === '24:00' || clock === '00:00') return 'midnight';
  if (clock === '12:00') return 'noon';
  const hour = Number(clock.slice(0, 2));
  const minutes = clock.slice(3) === '00' ? '' : `:${clock.slice(3)}`;
  return `${hour % 12 === 0 ? 12 : hour % 12}${minutes} ${hour < 12 ? 'am' : 'pm'}`;
}
