import type { MoneyView } from '#shared/api/money.ts';
import { cycleRangeWithYear, fullDate, money } from '#src/lib/format.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';

type IncentiveCycle = NonNullable<MoneyView['incentive']>['cycles'][number];

/** What each cycle earned, which receipt pays it and what is still owed, the latest first. */
export function IncentiveCycles({ cycles, separate }: { cycles: readonly IncentiveCycle[]; separate: boolean }) {
  const guessed = separate && cycles.some((cycle) => cycle.paidBy.some((part) => !part.stated));
  return (
    <details className="mt-5">
      <summary className="link inline-flex min-h-11 cursor-pointer items-center">
        Earned and paid, cycle by cycle
      </summary>
      {guessed && (
        <p className="hint">A receipt that does not say which days it covers is matched to the oldest earned first.</p>
      )}
      <table className="ruled ruled-stack">
        <thead>
          <tr>
            <th scope="col">Cycle</th>
            <th scope="col">Earned</th>
            <th scope="col" className="text">
              Paid by
            </th>
            <th scope="col">Still owed</th>
          </tr>
        </thead>
        <tbody>
          {[...cycles].reverse().map(({ from, earned, paidBy, owedCents }) => (
            <tr key={earned.id}>
              <th scope="row">
                {cycleRangeWithYear(from, earned.date)}
                {earned.estimated && <span className="hint">, an estimate</span>}
              </th>
              <td data-label="Earned">
                <MoneyFigure title={earned.label} cents={earned.amountCents} working={earned.working} />
              </td>
              <td className="text" data-label="Paid by">
                {paidBy.length === 0 ? '–' : paidBy.map((part) => paidWords(part, separate)).join('; ')}
              </td>
              <td data-label="Still owed">{money(owedCents)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </details>
  );
}

function paidWords({ on, amountCents, stated }: IncentiveCycle['paidBy'][number], separate: boolean): string {
  if (!separate) return 'the bill';
  return `${fullDate(on)}, ${money(amountCents)}${stated ? '' : ', oldest first'}`;
}
