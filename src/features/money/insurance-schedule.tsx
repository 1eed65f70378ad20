import { useState } from 'react';
import { type MortgageScheduleRow, type MortgageView, moneyMortgageApi } from '#shared/api/money-mortgage.ts';
import { sumCents } from '#shared/units/cents.ts';
import { addressOf } from '#src/lib/api.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { Fold } from '#src/ui/fold.tsx';

/** The mortgage's schedule, a year to a row with its sums; a year opens to its payments. */
export function InsuranceSchedule({ view, householdId }: { view: MortgageView; householdId: string }) {
  const years = byYear(view.schedule);
  const last = view.schedule.at(-1);
  return (
    <Fold title="The mortgage’s schedule" summary={last ? `to ${fullDate(last.on)}` : ''}>
      <p className="hint">
        As paid: with extra principal and the balances of statements. Bold: stated by the lender.{' '}
        <a
          className="underline underline-offset-3"
          href={addressOf(moneyMortgageApi.scheduleCsv, { householdId })}
          download
        >
          Schedule, CSV
        </a>
      </p>
      {years.map(([year, rows]) => (
        <Year key={year} year={year} rows={rows} />
      ))}
    </Fold>
  );
}

/** Its rows are drawn only while it is open: a mortgage has some hundreds. */
function Year({ year, rows }: { year: string; rows: MortgageScheduleRow[] }) {
  const [open, setOpen] = useState(false);
  const interest = sumCents(rows.map((row) => row.interestCents));
  return (
    <details className="border-t border-rule" onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary className="flex min-h-11 cursor-pointer flex-wrap items-center gap-x-5 py-1">
        <b className="w-14">{year}</b>
        <span className="hint">
          interest {money(interest)}; left {money(rows.at(-1)?.balanceCents ?? interest)}
        </span>
      </summary>
      {open && (
        <table className="ruled ruled-stack ruled-tight mb-3">
          <thead>
            <tr>
              <th scope="col">Due</th>
              <th scope="col">Payment</th>
              <th scope="col">Interest</th>
              <th scope="col">Principal</th>
              <th scope="col">Extra</th>
              <th scope="col">Balance</th>
              <th scope="col">By the initial schedule</th>
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.number} className={row.past ? undefined : 'text-soft'}>
                <th scope="row">{fullDate(row.on)}</th>
                <td data-label="Payment">{money(row.paymentCents)}</td>
                <td data-label="Interest">{money(row.interestCents)}</td>
                <td data-label="Principal">{money(row.principalCents)}</td>
                <td data-label="Extra">{money(row.extraPrincipalCents)}</td>
                <td data-label="Balance" className={row.stated ? 'font-semibold' : undefined}>
                  {money(row.balanceCents)}
                </td>
                <td data-label="By the initial schedule">{money(row.initialCents)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </details>
  );
}

function byYear(rows: readonly MortgageScheduleRow[]): [string, MortgageScheduleRow[]][] {
  const years = new Map<string, MortgageScheduleRow[]>();
  for (const row of rows) {
    const year = row.on.slice(0, 4);
    years.set(year, [...(years.get(year) ?? []), row]);
  }
  return [...years];
}
