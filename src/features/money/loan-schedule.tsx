import type { MoneyView, ScheduleRow } from '#shared/api/money.ts';
import { sumCents } from '#shared/units/cents.ts';
import { fullDate, money } from '#src/lib/format.ts';

/** The schedule, a fold for each year with its sums in the head; the year in which the next payment falls stands open. */
export function LoanSchedule({ loan }: { loan: NonNullable<MoneyView['loan']> }) {
  const years = byYear(loan.schedule);
  const next = loan.schedule.find((row) => !row.past)?.on.slice(0, 4);
  return (
    <details className="mt-5">
      <summary className="link inline-flex min-h-11 cursor-pointer items-center">Schedule, year by year</summary>
      <p className="hint">Bold: recorded. The last payment is trued, so that the balance ends at zero.</p>
      {years.map(([year, rows]) => (
        <details key={year} open={year === next} className="border-t border-rule">
          <summary className="flex min-h-11 cursor-pointer flex-wrap items-center gap-x-5 py-1">
            <b className="w-14">{year}</b>
            <span className="hint">
              paid {money(sumCents(rows.map((row) => row.paymentCents)))}, of it interest{' '}
              {money(sumCents(rows.map((row) => row.interestCents)))}; left{' '}
              {money(rows.at(-1)?.balanceCents ?? loan.payoffCents)}
            </span>
          </summary>
          <table className="ruled ruled-stack ruled-tight mb-3">
            <thead>
              <tr>
                <th scope="col">Due</th>
                <th scope="col">Payment</th>
                <th scope="col">Interest</th>
                <th scope="col">Principal</th>
                <th scope="col">Balance</th>
              </tr>
            </thead>
            <tbody>
              {rows.map((row) => (
                <tr key={`${row.number} ${row.on}`} className={row.past ? undefined : 'text-soft'}>
                  <th scope="row" className={row.recorded ? 'font-semibold!' : undefined}>
                    {fullDate(row.on)}
                    {row.recorded && ', recorded'}
                  </th>
                  <td data-label="Payment">{money(row.paymentCents)}</td>
                  <td data-label="Interest">{money(row.interestCents)}</td>
                  <td data-label="Principal">{money(row.principalCents)}</td>
                  <td data-label="Balance">{money(row.balanceCents)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </details>
      ))}
    </details>
  );
}

function byYear(rows: readonly ScheduleRow[]): [string, ScheduleRow[]][] {
  const years = new Map<string, ScheduleRow[]>();
  for (const row of rows) {
    const year = row.on.slice(0, 4);
    years.set(year, [...(years.get(year) ?? []), row]);
  }
  return [...years];
}
