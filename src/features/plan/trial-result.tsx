import type { TrialRow, TrialView } from '#shared/api/plan.ts';
import type { Cents } from '#shared/units/cents.ts';
import { cycleRange, decimal, dollarsSize, money } from '#src/lib/format.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Missing, Money } from '#src/ui/money.tsx';
import { FigureButton } from '#src/ui/working.tsx';

/** The trial's sentence and its cycles side by side. */
export function TrialResult({ view }: { view: TrialView }) {
  const { rows, totals } = view;
  if (rows.length === 0) return <p className="mt-5">There is no cycle to try it on yet. Log a month first.</p>;
  const unsettled = rows.filter((row) => row.trial === null);
  return (
    <div className="mt-7" aria-live="polite">
      <p className="text-2xl font-light">
        {totals ? trialSentence(totals) : 'None of these cycles can be settled on this plan.'}
      </p>
      <p className="hint mt-1">
        {view.pricesTakenBack && 'The plan’s first prices are used for the cycles before them too. '}
        {totals &&
          totals.paidApartCents !== 0 &&
          `${money(totals.paidApartCents)} would have been paid apart from the bills. `}
        {view.left.map(
          ({ label, unit, amount }) =>
            `${label}: ${unit === 'USD' ? `$${decimal(amount)}` : `${decimal(amount)} kWh`} left at the end. `,
        )}
        {view.riders.map((rider) => `${riderSentence(rider)} `)}
      </p>
      {unsettled.length > 0 && (
        <div className="margin-note mt-4">
          <b>{unsettled.length === 1 ? 'One cycle' : `${unsettled.length} cycles`} could not be settled on it</b>
          <span>{[...new Set(unsettled.map((row) => row.why ?? ''))].join(' ')} They are left out of the totals.</span>
        </div>
      )}
      <table className="ruled ruled-stack mt-4">
        <caption className="visually-hidden">Each cycle as billed, on the present plan and on the plan tried</caption>
        <thead>
          <tr>
            <th scope="col">Cycle</th>
            <th scope="col">Billed</th>
            <th scope="col">Present plan</th>
            <th scope="col">Plan tried</th>
            <th scope="col">Difference</th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <Row key={row.to} row={row} />
          ))}
          {totals && (
            <tr className="total">
              <th scope="row">
                {totals.cycles} {totals.cycles === 1 ? 'cycle' : 'cycles'}
              </th>
              <td data-label="Billed">
                <MoneyFigure title="Billed" cents={totals.billed.amountCents} working={totals.billed.working} />
              </td>
              <td data-label="Present plan">
                <MoneyFigure
                  title="On the present plan"
                  cents={totals.present.amountCents}
                  working={totals.present.working}
                />
              </td>
              <td data-label="Plan tried">
                <MoneyFigure
                  title="On the plan tried"
                  cents={totals.trial.amountCents}
                  working={totals.trial.working}
                />
              </td>
              <td data-label="Difference">
                <FigureButton
                  title="Difference"
                  text={money(totals.difference.amountCents)}
                  working={totals.difference.working}
                  className={toneOf(totals.difference.amountCents)}
                />
              </td>
            </tr>
          )}
        </tbody>
      </table>
    </div>
  );
}

/** A lower bill is good news, whatever its sign. */
function toneOf(difference: Cents): string | undefined {
  return difference < 0 ? 'pos' : difference > 0 ? 'neg' : undefined;
}

function Row({ row }: { row: TrialRow }) {
  const cycle = cycleRange(row.from, row.to);
  const difference = row.trial && row.present ? ((row.trial.amountCents - row.present.amountCents) as Cents) : null;
  return (
    <tr>
      <th scope="row">{cycle}</th>
      <td data-label="Billed">
        <Money cents={row.billedCents} />
      </td>
      <td data-label="Present plan">
        {row.present ? (
          <MoneyFigure title={`Present plan, ${cycle}`} cents={row.present.amountCents} working={row.present.working} />
        ) : (
          <Missing reason="The present plan cannot settle this cycle" />
        )}
      </td>
      <td data-label="Plan tried">
        {row.trial ? (
          <MoneyFigure title={`Plan tried, ${cycle}`} cents={row.trial.amountCents} working={row.trial.working} />
        ) : (
          <Missing reason={row.why ?? 'Not known'} />
        )}
      </td>
      <td data-label="Difference">
        {difference === null ? (
          <Missing reason="One of the two is not known" />
        ) : (
          <span className={toneOf(difference)}>{money(difference)}</span>
        )}
      </td>
    </tr>
  );
}

/** "The last 12 cycles would have cost $214 less on this plan: $1,020 instead of $1,234." */
export function trialSentence(totals: NonNullable<TrialView['totals']>): string {
  const { difference, trial, present, cycles } = totals;
  const these = cycles === 1 ? 'This cycle' : `These ${cycles} cycles`;
  const cents = difference.amountCents;
  if (cents === 0) return `${these} would have cost the same on this plan: ${money(trial.amountCents)}.`;
  return `${these} would have cost ${dollarsSize(cents)} ${cents < 0 ? 'less' : 'more'} on this plan: ${money(trial.amountCents)} instead of ${money(present.amountCents)}.`;
}

/** What is assumed of a rider whose price comes with each bill. */
export function riderSentence({ label, asPrinted, cycles }: TrialView['riders'][number]): string {
  if (asPrinted === 0)
    return `${label}: no bill of yours prints its price, so the price written in the plan is used; real bills would differ.`;
  if (asPrinted === cycles) return `${label}: at the price your bill printed for each cycle.`;
  return `${label}: at the price your bills printed for ${asPrinted} of ${cycles} cycles, and at the plan’s own before the first.`;
}
