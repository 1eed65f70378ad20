import { useState } from 'react';
import type { CreditView } from '#shared/api/credit.ts';
import type { CreditCost } from '#shared/facts/finance.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { Money } from '#src/ui/money.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { CostDialog } from './cost-dialog.tsx';
import { ratePercent } from './credit-words.ts';

type Vintage = CreditView['vintages'][number];

/** "What the cost is made of", by the year in which it was completed: what adds to line 1, what comes off it, and what is left out and why. */
export function CostSheet({ view, householdId, canEdit }: { view: CreditView; householdId: string; canEdit: boolean }) {
  const [editing, setEditing] = useState<CreditCost | null>(null);
  const change = canEdit ? setEditing : null;
  const roofOn = view.credit?.placedInServiceOn ?? null;
  return (
    <Sheet title="What the cost is made of">
      {view.vintages.map((vintage) => (
        <VintageTable
          key={vintage.year}
          vintage={vintage}
          roofOn={roofOn}
          alone={view.vintages.length === 1}
          change={change}
        />
      ))}
      {view.undated.length > 0 && (
        <>
          <p className="margin-note mt-4">
            No day of completion is stated for these, so they earn nothing yet. Enter the day the installation was
            completed in the set-up.
          </p>
          <ul className="mt-2 border-t border-rule">
            {view.undated.map((cost) => (
              <li key={cost.id} className="flex justify-between gap-5 border-b border-rule py-2 text-soft">
                <span>{cost.label}</span>
                <span>{money(cost.amountCents)}</span>
              </li>
            ))}
          </ul>
        </>
      )}
      {editing && <CostDialog cost={editing} householdId={householdId} onClose={() => setEditing(null)} />}
    </Sheet>
  );
}

function VintageTable({
  vintage,
  roofOn,
  alone,
  change,
}: {
  vintage: Vintage;
  roofOn: string | null;
  alone: boolean;
  change: ((cost: CreditCost) => void) | null;
}) {
  const counted = vintage.costs.filter((cost) => cost.treatment !== 'leftOut');
  const leftOut = vintage.costs.filter((cost) => cost.treatment === 'leftOut');
  return (
    <>
      {!alone && <h3 className="mt-4">Completed in {vintage.year}</h3>}
      <table className="ruled">
        <caption className="visually-hidden">Costs completed in {vintage.year}</caption>
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
                <CostName cost={cost} roofOn={roofOn} change={change} />
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
          {vintage.share !== '1' && (
            <tr>
              <th scope="row">
                Share for the home
                <span className="hint">, under 80% only this share counts</span>
              </th>
              <td>{ratePercent(vintage.share)}</td>
            </tr>
          )}
          <tr className="total">
            <th scope="row">
              Line 1{alone ? '' : ` of ${vintage.year}`}
              {vintage.state === 'noCredit' && (
                <span className="hint font-normal"> no credit for what was completed in {vintage.year}</span>
              )}
              {vintage.state === 'inCarriedIn' && <span className="hint font-normal"> inside what was carried in</span>}
            </th>
            <td>
              <Money cents={vintage.line1Cents} />
            </td>
          </tr>
          {leftOut.map((cost) => (
            <tr key={cost.id} className="text-soft">
              <th scope="row" className="text-soft!">
                <CostName cost={cost} roofOn={roofOn} change={change} />
              </th>
              <td>{money(cost.amountCents)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="hint mt-1">
        {vintage.rate === '0' ? 'No credit' : ratePercent(vintage.rate)}: 26 U.S.C. 25D(g), {vintage.law}.
      </p>
    </>
  );
}

/** Its words, its reason, its own day, and the way to change what the set-up does not ask. */
function CostName({
  cost,
  roofOn,
  change,
}: {
  cost: CreditCost;
  roofOn: string | null;
  change: ((cost: CreditCost) => void) | null;
}) {
  const own = cost.placedInServiceOn !== null && cost.placedInServiceOn !== roofOn;
  return (
    <>
      {cost.label}
      {cost.treatment === 'leftOut' && ', left out'}
      {cost.reason && <span className="hint">: {cost.reason}</span>}
      {own && cost.placedInServiceOn && (
        <span className="hint block">completed {fullDate(cost.placedInServiceOn)}</span>
      )}
      {change && (
        <button
          type="button"
          className="link no-print ml-3 min-h-11 text-[15px] font-normal text-soft sm:min-h-6"
          onClick={() => change(cost)}
        >
          {cost.documentId ? 'Day, paper' : 'Add day or paper'}
          <span className="visually-hidden"> of {cost.label}</span>
        </button>
      )}
    </>
  );
}
