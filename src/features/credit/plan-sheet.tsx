import type { CreditView } from '#shared/api/credit.ts';
import { dollars, money } from '#src/lib/format.ts';
import { Button } from '#src/ui/button.tsx';
import { Missing, Money } from '#src/ui/money.tsx';
import { Sheet } from '#src/ui/sheet.tsx';

/** How what is left is meant to be used: the limits the owner expects, and what no year plans for. The projection takes it over. */
export function PlanSheet({ view, addYear }: { view: CreditView; addYear: (() => void) | null }) {
  const { plan } = view;
  if (plan === null || (plan.years.length === 0 && (plan.unplannedCents ?? 0) === 0)) return null;
  return (
    <Sheet title="Planned use of what is left" hint={planWords(plan)}>
      {plan.years.length > 0 && (
        <table className="ruled ruled-stack">
          <caption className="visually-hidden">Planned use, year by year</caption>
          <thead>
            <tr>
              <th scope="col" className="text">
                Tax year
              </th>
              <th scope="col">Limit expected</th>
              <th scope="col">Would use</th>
              <th scope="col">Would leave</th>
            </tr>
          </thead>
          <tbody>
            {plan.years.map((year) => (
              <tr key={year.taxYear}>
                <th scope="row">{year.taxYear}</th>
                <td data-label="Limit expected">
                  <Money cents={year.expectedLimitCents} missing="No limit is entered for this year" />
                </td>
                <td data-label="Would use">
                  <Money cents={year.usesCents} missing="Not known without a limit" />
                </td>
                <td data-label="Would leave">
                  <Money cents={year.leavesCents} missing="Not known without a limit" />
                </td>
              </tr>
            ))}
            <tr className="total">
              <th scope="row">No year plans for</th>
              <td />
              <td />
              <td>
                {plan.unplannedCents === null ? (
                  <Missing reason="Not known without every limit" />
                ) : (
                  money(plan.unplannedCents)
                )}
              </td>
            </tr>
          </tbody>
        </table>
      )}
      <p className="hint mt-2">
        A plan, not a promise: the limit of a return comes from that return. What no year plans for is not expected on
        any day in the projection.
      </p>
      {addYear && (
        <p className="no-print mt-3">
          <Button look="plain" onClick={addYear}>
            Plan another year
          </Button>
        </p>
      )}
    </Sheet>
  );
}

function planWords(plan: NonNullable<CreditView['plan']>): string {
  if (plan.leftCents === null) return 'What is left is not known until every limit before it is entered.';
  const years = plan.years.filter((year) => (year.usesCents ?? 0) > 0).length;
  const planned =
    years === 0 ? 'no year plans for it yet' : `${years === 1 ? 'one year plans' : `${years} years plan`} for it`;
  return `${dollars(plan.leftCents)} is left for returns not yet filed; ${planned}.`;
}
