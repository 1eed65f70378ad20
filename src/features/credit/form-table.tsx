import type { ReactNode } from 'react';
import type { CreditView } from '#shared/api/credit.ts';
import type { CreditLines } from '#shared/books/credit-lines.ts';
import type { CreditYear } from '#shared/facts/finance.ts';
import type { Cents } from '#shared/units/cents.ts';
import { Missing } from '#src/ui/money.tsx';
import { formAmount, ratePercent, returnWords } from './credit-words.ts';

type FormLine = {
  key: string;
  label: ReactNode;
  of: (line: CreditLines) => Cents | null;
  total?: boolean;
  missing?: string;
};

const WAITING = 'Not known until the limits of this year and those before it are entered';

/** Form 5695, Part I: years across, form lines down. `change` opens a year for the owner; null for those who only read. */
export function FormTable({ view, change }: { view: CreditView; change: ((taxYear: number) => void) | null }) {
  const { lines } = view;
  const yearOf = (taxYear: number) => view.credit?.years.find((year) => year.taxYear === taxYear);
  return (
    <div className="overflow-x-auto">
      <table className="ruled">
        <caption className="visually-hidden">Form 5695, Part I, year by year</caption>
        <thead>
          <tr>
            <th scope="col" className="text w-16">
              Line
            </th>
            <td />
            {lines.map((line) => (
              <th key={line.taxYear} scope="col" className="w-[19%] whitespace-nowrap">
                {line.taxYear}, {yearOf(line.taxYear)?.status ?? 'not entered'}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {formLines(view).map((row) => (
            <tr key={row.key} className={row.total ? 'total' : undefined}>
              <td className="text">
                <LineNumber view={view} line={row.key} />
              </td>
              <th scope="row" className="text-left!">
                {row.label}
              </th>
              {lines.map((line) => (
                <td key={line.taxYear}>
                  {row.key === 'line14' ? (
                    <Limit line={line} year={yearOf(line.taxYear)} change={change} />
                  ) : (
                    <FormAmount amount={row.of(line)} missing={row.missing ?? WAITING} />
                  )}
                </td>
              ))}
            </tr>
          ))}
          <tr>
            <td />
            <th scope="row" className="text-left! text-soft!">
              Return
            </th>
            {lines.map((line) => (
              <td key={line.taxYear} className="hint">
                {returnWords(yearOf(line.taxYear))
                  .split(', ')
                  .map((part) => (
                    <span key={part} className="block whitespace-nowrap">
                      {part}
                    </span>
                  ))}
                {change && (
                  <span className="no-print block">
                    <button
                      type="button"
                      className="link min-h-9 text-ink"
                      aria-label={`Change tax year ${line.taxYear}`}
                      onClick={() => change(line.taxYear)}
                    >
                      Change
                    </button>
                  </span>
                )}
              </td>
            ))}
          </tr>
        </tbody>
      </table>
    </div>
  );
}

/** The same on a phone: one block for each year, its lines under each other. */
export function FormBlocks({ view, change }: { view: CreditView; change: ((taxYear: number) => void) | null }) {
  const yearOf = (taxYear: number) => view.credit?.years.find((year) => year.taxYear === taxYear);
  return view.lines.map((line) => {
    const year = yearOf(line.taxYear);
    return (
      <section key={line.taxYear} className="mt-4">
        <h3 className="flex items-baseline justify-between border-b-2 border-ink pb-1">
          {line.taxYear}, {year?.status ?? 'not entered'}
          {change && (
            <button
              type="button"
              className="link no-print min-h-11 text-[15px] font-normal"
              aria-label={`Change tax year ${line.taxYear}`}
              onClick={() => change(line.taxYear)}
            >
              Change
            </button>
          )}
        </h3>
        <dl>
          {formLines(view).map((row) => (
            <div
              key={row.key}
              className={`flex items-baseline gap-3 py-1.5 ${row.total ? 'border-t border-b-4 border-double border-ink font-bold' : 'border-b border-rule'}`}
            >
              <dt className="flex grow gap-3">
                <span className="w-7 text-soft">
                  <LineNumber view={view} line={row.key} />
                </span>
                {row.label}
              </dt>
              <dd>
                {row.key === 'line14' ? (
                  <Limit line={line} year={year} change={change} />
                ) : (
                  <FormAmount amount={row.of(line)} missing={row.missing ?? WAITING} />
                )}
              </dd>
            </div>
          ))}
        </dl>
        <p className="hint mt-1">{returnWords(year)}</p>
      </section>
    );
  });
}

function formLines(view: CreditView): FormLine[] {
  const rates = [...new Set(view.lines.flatMap((line) => (line.rate === null ? [] : [line.rate])))];
  return [
    { key: 'line1', label: 'Qualified solar electric cost', of: (line) => line.line1Cents },
    {
      key: 'line6b',
      label: rates.length > 0 ? `Credit at ${rates.map(ratePercent).join(' and ')}` : 'Credit',
      of: (line) => line.line6bCents,
    },
    { key: 'line12', label: 'Carried in', of: (line) => line.line12Cents },
    { key: 'line13', label: 'Available', of: (line) => line.line13Cents },
    { key: 'line14', label: 'Limit, from the worksheet', of: (line) => line.line14Cents },
    { key: 'line15', label: 'Used', of: (line) => line.line15Cents, total: true },
    { key: 'line16', label: 'Carried forward', of: (line) => line.line16Cents },
  ];
}

/** The line's number where all years agree on it, else each year's own. */
function LineNumber({ view, line }: { view: CreditView; line: string }) {
  return [...new Set(view.forms.map((form) => form.lines[line] ?? ''))].filter((number) => number !== '').join(' / ');
}

function FormAmount({ amount, missing }: { amount: Cents | null; missing: string }) {
  if (amount === null) return <Missing reason={missing} />;
  return <span className={amount === 0 ? 'text-soft' : undefined}>{formAmount(amount)}</span>;
}

function Limit({
  line,
  year,
  change,
}: {
  line: CreditLines;
  year: CreditYear | undefined;
  change: ((taxYear: number) => void) | null;
}) {
  if (line.line14Cents === null) {
    if (!change) return <Missing reason="The owner has not entered the limit of this year" />;
    return (
      <button type="button" className="link" onClick={() => change(line.taxYear)}>
        enter it
      </button>
    );
  }
  const expected = (year?.status ?? 'planned') === 'planned';
  return (
    <span
      className={expected ? 'text-soft' : undefined}
      title={year?.typedBy ? `Entered by ${year.typedBy}` : undefined}
    >
      {formAmount(line.line14Cents)}
      {expected && ' expected'}
    </span>
  );
}
