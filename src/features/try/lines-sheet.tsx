import { lazy, Suspense, useState } from 'react';
import { fullDate } from '#src/lib/format.ts';
import { Missing, Money } from '#src/ui/money.tsx';
import { Prose } from '#src/ui/prose.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { usePhone } from '#src/ui/use-media.ts';
import { dashText } from './line-look.ts';
import { linesSummary, type TryLine } from './try-lines.ts';

const LinesChart = lazy(() => import('./lines-chart.tsx'));

/** Settled today as things stand and with the changes: drawn, said, and as a table. */
export function LinesSheet({ lines }: { lines: readonly TryLine[] }) {
  const phone = usePhone();
  const [table, setTable] = useState(false);
  const summary = linesSummary(lines);
  const height = phone ? 'h-[230px]' : 'h-[320px]';
  return (
    <Sheet title="Settled today, projected">
      <ul className="hint mt-1 mb-2 flex flex-wrap gap-x-6">
        {lines.map((line) => (
          <li key={line.key}>
            <svg width="34" height="8" className="mr-2 inline-block align-middle" aria-hidden="true">
              <line
                x1="0"
                x2="34"
                y1="4"
                y2="4"
                stroke={`var(${line.look.token})`}
                strokeWidth={line.look.width}
                strokeDasharray={dashText(line.look)}
              />
            </svg>
            {line.look.letter !== '' && lines.length > 2 && <b className="text-ink">{line.look.letter} </b>}
            {line.name}
          </li>
        ))}
      </ul>
      <div className="-mx-1">
        <Suspense fallback={<div className={`bone ${height}`} aria-busy="true" />}>
          <LinesChart lines={lines} summary={summary} phone={phone} />
        </Suspense>
      </div>
      <div className="mt-2 flex flex-wrap items-baseline gap-x-5 gap-y-1">
        <p className="hint grow basis-[420px]">
          <Prose text={summary} />
        </p>
        <button
          type="button"
          className="link no-print min-h-11 text-[15px] sm:min-h-0"
          aria-expanded={table}
          onClick={() => setTable(!table)}
        >
          {table ? 'Hide the table' : 'Show as table'}
        </button>
      </div>
      {table && <LinesTable lines={lines} />}
    </Sheet>
  );
}

function LinesTable({ lines }: { lines: readonly TryLine[] }) {
  const [base] = lines;
  const columns = lines.map((line) => ({
    ...line,
    byDay: new Map(line.outcome.months.map((month) => [month.on, month.settledTodayCents])),
  }));
  return (
    <section
      className="mt-4 max-h-[460px] overflow-auto border-t border-rule"
      // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable by keyboard
      tabIndex={0}
      aria-label="The chart as a table"
    >
      <table className="ruled text-[15px] whitespace-nowrap">
        <caption className="visually-hidden">Settled today, month by month</caption>
        <thead className="sticky top-0 bg-sheet">
          <tr>
            <th scope="col">To</th>
            {columns.map((line) => (
              <th key={line.key} scope="col">
                {line.name}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {base?.outcome.months.map(({ on }) => (
            <tr key={on}>
              <th scope="row">{fullDate(on)}</th>
              {columns.map((line) => {
                const amount = line.byDay.get(on);
                return (
                  <td key={line.key}>
                    {amount === undefined ? <Missing reason="After the sale" /> : <Money cents={amount} />}
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
