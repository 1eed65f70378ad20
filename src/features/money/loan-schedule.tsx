import { lazy, type ReactNode, Suspense, useMemo, useState } from 'react';
import { type LoanScheduleRow, type LoanView, moneyLoanApi } from '#shared/api/money-loan.ts';
import { addressOf } from '#src/lib/api.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { usePhone } from '#src/ui/use-media.ts';
import type { LoanProps } from './loan-props.ts';
import { chartSummary } from './loan-words.ts';
import { type LoanYear, loanYears } from './loan-years.ts';

const LoanChart = lazy(() => import('./loan-chart.tsx'));

/** Principal and interest over the years: drawn, in a sentence, and as the schedule, a fold for each year. */
export function LoanSchedule({ loan, householdId }: LoanProps) {
  const phone = usePhone();
  const years = useMemo(() => loanYears(loan), [loan]);
  const summary = chartSummary(loan);
  const next = loan.schedule.find((row) => !row.past)?.on.slice(0, 4);
  return (
    <Sheet
      title="Principal and interest"
      actions={
        <a
          className="no-print inline-flex min-h-11 items-center underline underline-offset-3 sm:min-h-6"
          href={addressOf(moneyLoanApi.scheduleCsv, { householdId })}
          download
        >
          Schedule, CSV
        </a>
      }
    >
      <p className="hint mt-0.5 flex flex-wrap gap-x-5">
        <Key className="bg-loan">principal paid in the year</Key>
        <Key className="bg-doubt-rule">interest paid in the year</Key>
      </p>
      <Suspense fallback={<div className={`bone ${phone ? 'h-[220px]' : 'h-[260px]'}`} aria-busy="true" />}>
        <LoanChart years={years} summary={summary} phone={phone} />
      </Suspense>
      <p className="hint mt-1">{summary} Hatched: to come, if every payment is made to schedule.</p>
      <h3 className="mt-6">Schedule, year by year</h3>
      <p className="hint">
        Bold: as entered. Grey: to come. The last payment is trued, so that the balance ends at zero.
      </p>
      <div className="mt-1 border-t-2 border-ink">
        {years.map((year) => (
          <Year key={year.year} year={year} loan={loan} isOpen={year.year === next} />
        ))}
      </div>
    </Sheet>
  );
}

function Key({ className, children }: { className: string; children: ReactNode }) {
  return (
    <span className="whitespace-nowrap">
      <i aria-hidden="true" className={`mr-2 inline-block size-3 align-[-1px] ${className}`} />
      {children}
    </span>
  );
}

/** Its rows are drawn only while it is open: a loan has some hundreds. */
function Year({ year, loan, isOpen }: { year: LoanYear; loan: LoanView; isOpen: boolean }) {
  const [open, setOpen] = useState(isOpen);
  return (
    <details className="border-b border-rule" open={open} onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary className="flex min-h-11 cursor-pointer flex-wrap items-center gap-x-5 py-1">
        <b className={`w-14 ${year.past ? '' : 'text-soft'}`}>{year.year}</b>
        <span className="hint">
          paid {money(year.paidCents)}, of it interest {money(year.interestCents)}; left {money(year.leftCents)}
        </span>
      </summary>
      {open && <YearTable year={year} loan={loan} />}
    </details>
  );
}

function YearTable({ year, loan }: { year: LoanYear; loan: LoanView }) {
  const has = (part: (row: LoanScheduleRow) => number) => year.rows.some((row) => part(row) !== 0);
  const joined = has((row) => row.capitalisedCents);
  const drift = has((row) => row.driftCents);
  const unpaid = has((row) => row.unpaidInterestCents);
  return (
    <table className="ruled ruled-stack ruled-tight mb-3">
      <caption className="visually-hidden">Payments of {year.year}</caption>
      <thead>
        <tr>
          <th scope="col">On</th>
          <th scope="col">Payment</th>
          <th scope="col">Interest</th>
          <th scope="col">Principal</th>
          {joined && <th scope="col">Joined the principal</th>}
          {drift && <th scope="col">Lender less ours</th>}
          {unpaid && <th scope="col">Interest unpaid</th>}
          <th scope="col">Balance</th>
        </tr>
      </thead>
      <tbody>
        {year.rows.map((row) => (
          <tr
            key={`${row.segment} ${row.number} ${row.on} ${row.refinanced}`}
            className={row.past ? undefined : 'text-soft'}
          >
            <th scope="row" className={row.recorded ? 'font-semibold!' : undefined}>
              {fullDate(row.on)}
              {row.recorded && ', as entered'}
              {row.refinanced && ', paid off by a new loan'}
            </th>
            <td data-label="Payment">
              <MoneyFigure
                title={`Payment of ${fullDate(row.on)}`}
                cents={row.payment.amountCents}
                working={workingOf(row, loan)}
              />
            </td>
            <td data-label="Interest">{money(row.interestCents)}</td>
            <td data-label="Principal">{money(row.principalCents)}</td>
            {joined && <td data-label="Joined the principal">{money(row.capitalisedCents)}</td>}
            {drift && <td data-label="Lender less ours">{money(row.driftCents)}</td>}
            {unpaid && <td data-label="Interest unpaid">{money(row.unpaidInterestCents)}</td>}
            <td data-label="Balance">{money(row.balanceCents)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function workingOf(row: LoanScheduleRow, loan: LoanView) {
  const { level, working } = row.payment;
  return level === null ? working : (loan.levels[level]?.working ?? null);
}
