import { lazy, Suspense, useMemo, useState } from 'react';
import type { MortgageView } from '#shared/api/money-mortgage.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { usePhone } from '#src/ui/use-media.ts';
import { ltvFlags, ltvRows } from './insurance-days.ts';
import { ltvSummary, percentOf } from './insurance-words.ts';

const LtvChart = lazy(() => import('./insurance-ltv-chart.tsx'));

/** Loan-to-value over time as a chart, in a sentence, and as a table. */
export function LoanToValue({ view }: { view: MortgageView }) {
  const phone = usePhone();
  const [table, setTable] = useState(false);
  const summary = ltvSummary(view);
  const drawn = useMemo(() => ({ view, rows: ltvRows(view), flags: ltvFlags(view) }), [view]);
  const { flags } = drawn;
  return (
    <div className="min-w-0">
      <h3>Loan-to-value over time</h3>
      <p className="hint mt-1 flex flex-wrap gap-x-5" aria-hidden="true">
        <Key className="bg-ink" words="of the original value" />
        {view.schedule.some((row) => row.balanceCents !== row.initialCents) && (
          <Key className="bg-soft" words="by the initial schedule" />
        )}
        {view.latest && <Key className="bg-credit" words="of the last value stated" />}
      </p>
      {flags.length > 0 && (
        <ol className="hint mt-1 flex flex-wrap gap-x-5">
          {flags.map((flag) => (
            <li key={flag.number}>
              {!phone && <b className="text-ink">{flag.number} </b>}
              {flag.words}, {fullDate(flag.on)}
            </li>
          ))}
        </ol>
      )}
      <Suspense fallback={<div className="bone h-[300px]" aria-busy="true" />}>
        <LtvChart drawn={drawn} summary={summary} phone={phone} />
      </Suspense>
      <p className="hint mt-1">{summary} Dashed: to come, if every payment is made as scheduled.</p>
      <p className="no-print">
        <button
          type="button"
          className="link min-h-11 text-[15px] sm:min-h-9"
          aria-expanded={table}
          onClick={() => setTable(!table)}
        >
          {table ? 'Hide the table' : 'Show as table'}
        </button>
      </p>
      {table && <LtvTable view={view} />}
    </div>
  );
}

function Key({ className, words }: { className: string; words: string }) {
  return (
    <span className="whitespace-nowrap">
      <i className={`mr-2 inline-block h-[3px] w-[26px] align-middle ${className}`} />
      {words}
    </span>
  );
}

/** Every twelfth payment, and the last drawn. */
function LtvTable({ view }: { view: MortgageView }) {
  const { latest, facts } = view;
  const rows = ltvRows(view);
  const shown = rows.filter((row, index) => row.number % 12 === 1 || index === rows.length - 1);
  return (
    <table className="ruled ruled-stack ruled-tight">
      <caption className="visually-hidden">Loan-to-value, once a year</caption>
      <thead>
        <tr>
          <th scope="col">After the payment of</th>
          <th scope="col">Balance</th>
          <th scope="col">Of the original value</th>
          <th scope="col">By the initial schedule</th>
          {latest && <th scope="col">Of the last value</th>}
        </tr>
      </thead>
      <tbody>
        {shown.map((row) => (
          <tr key={row.number} className={row.past ? undefined : 'text-soft'}>
            <th scope="row">{fullDate(row.on)}</th>
            <td data-label="Balance">{money(row.balanceCents)}</td>
            <td data-label="Of the original value">{percentOf(row.balanceCents, facts.originalValueCents)} %</td>
            <td data-label="By the initial schedule">{percentOf(row.initialCents, facts.originalValueCents)} %</td>
            {latest && (
              <td data-label="Of the last value">
                {row.on < latest.on ? '' : `${percentOf(row.balanceCents, latest.valueCents)} %`}
              </td>
            )}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
