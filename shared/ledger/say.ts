import { type Wh, wh } from '../units/energy.ts';
import { groupedWhole, MINUS } from '../units/words.ts';

export {
  dateWords as sayDate,
  dayWords as sayDay,
  dollarsWords as sayDollars,
  moneyWords as sayMoney,
  monthWords as sayMonth,
} from '../units/words.ts';

/** Whole kWh with thousands commas, "1,284"; with its decimals where it is not whole and below 100. */
export function sayKwh(amount: Wh): string {
  const size = Math.abs(amount);
  const sign = amount < 0 ? MINUS : '';
  if (size >= 100_000 || size % 1000 === 0) return `${sign}${groupedWhole(Math.round(size / 1000))}`;
  const tenths = Math.round(size / 100);
  return `${sign}${Math.floor(tenths / 10)}.${tenths % 10}`;
}

/** A difference between two energies, without its sign: whole kWh from ten on, "44"; else with one decimal, "1.4". */
export function sayGap(difference: Wh): string {
  const size = Math.abs(difference);
  return sayKwh(wh(size >= 10_000 ? Math.round(size / 1000) * 1000 : size));
}

/** "1 day", "31 days". */
export function sayCount(count: number, one: string, many: string): string {
  return `${groupedWhole(count)} ${count === 1 ? one : many}`;
}
