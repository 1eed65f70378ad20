import { Exact } from '../units/rate.ts';

/** Each line may be a cent off, since both sides round it once (ledger.md §4). */
export const LINE_TOLERANCE_CENTS = 1;

/** Half a cent for each line added (net-metering.md §5), and never less than the cent of a single line. */
export function totalToleranceCents(lines: number): number {
  return Math.max(LINE_TOLERANCE_CENTS, Math.floor(lines / 2));
}

/** Half of the last digit printed: "470" kWh stand for anything from 469.5 to 470.5. */
export function lastDigit(text: string): Exact {
  const dot = text.indexOf('.');
  return new Exact(10).pow(dot < 0 ? 0 : dot + 1 - text.length).div(2);
}
