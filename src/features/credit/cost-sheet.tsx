import type { CreditView } from '#shared/api/credit.ts';
import { money } from '#src/lib/format.ts';
import { Money } from '#src/ui/money.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { ratePercent } from './credit-words.ts';

/** "What the cost is made of": what adds to line 1, what comes off it, and what was left out and why. */
export function CostSheet({ view }: { view: CreditView }) {
  const { credit, lines } = view;
  if (!credit) return null;
  const counted = credit.costs.filter((cost) => cost.treatment !== 'leftOut');
  const leftOut = credit.costs.filter((cost) => cost.treatment === 'leftOut');
  const line1 = lines.find((line) => line.line1Cents > 0)?.line1Cents ?? null;
  return (
    <Sheet title="What the cost is made of">
      <table className="ruled">
        <thead>
          <tr>
            <td />
            <th scope="col">Amount</th>
          </tr>
        </thead>
        <tbody>
          {counted.map((cost) => (
            <tr key={cost.id}>
              <th scope="row">
                {cost.label}
                {cost.reason && <span className="hint">, {cost.reason}</span>}
              </th>
              <td>
                {cost.treatment === 'reduction' ? (
                  <span className="neg">{`−${money(cost.amountCents)}`}</span>
                ) : (
                  <Money cents={cost.amountCents} />
                )}
              </td>
            </tr>
          ))}
          {credit.homeShare !== '1' && (
            <tr>
              <th scope="row">Share for the home</th>
              <td>{ratePercent(credit.homeShare)}</td>
            </tr>
          )}
          <tr className="total">
            <th scope="row">Line 1</th>
            <td>
              <Money cents={line1} missing="No year of this credit has a cost yet" />
            </td>
          </tr>
          {leftOut.map((cost) => (
            <tr key={cost.id} className="text-soft">
              <th scope="row" className="text-soft!">
                {cost.label}, left out
                {cost.reason && <span className="hint">: {cost.reason}</span>}
              </th>
              <td>{money(cost.amountCents)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </Sheet>
  );
}
