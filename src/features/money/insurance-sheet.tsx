import { useQuery } from '@tanstack/react-query';
import type { MortgageView } from '#shared/api/money-mortgage.ts';
import { fullDate, money } from '#src/lib/format.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { percentWords } from '#src/lib/typed-values.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Fold } from '#src/ui/fold.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FactsList } from './facts-list.tsx';
import { InsuranceAsks, InsuranceChecklist } from './insurance-asks.tsx';
import { InsuranceEnds } from './insurance-ends.tsx';
import { LoanToValue } from './insurance-ltv.tsx';
import { InsurancePremiums } from './insurance-premiums.tsx';
import type { InsuranceProps } from './insurance-props.ts';
import { mortgageQuery } from './insurance-queries.ts';
import { InsuranceBalances, InsuranceValues } from './insurance-records.tsx';
import { InsuranceSchedule } from './insurance-schedule.tsx';
import { insuranceStanding } from './insurance-words.ts';

/** Mortgage insurance: what the roof avoided, loan-to-value, when it could have gone anyway, and what a request to take it off rests on. */
export function InsuranceSheet({
  householdId,
  canEdit,
  today,
}: {
  householdId: string;
  canEdit: boolean;
  today: string;
}) {
  const answer = useQuery(mortgageQuery(householdId));
  if (answer.isPending) {
    return (
      <Sheet title="Mortgage insurance">
        <div className="bone h-64" aria-busy="true" />
      </Sheet>
    );
  }
  if (answer.isError) {
    return (
      <Sheet title="Mortgage insurance">
        <p className="neg">{errorWords(answer.error)}</p>
        <button type="button" className="link min-h-11" onClick={() => answer.refetch()}>
          Try again
        </button>
      </Sheet>
    );
  }
  const view = answer.data.mortgage;
  return view === null ? null : <InsuranceBody view={view} householdId={householdId} canEdit={canEdit} today={today} />;
}

function InsuranceBody(props: InsuranceProps) {
  const { view } = props;
  const { facts } = view;
  const gone = facts.insurance !== null && facts.insurance.removedOn !== null;
  return (
    <Sheet title="Mortgage insurance" hint={insuranceStanding(view)}>
      {view.warnings.map((warning) => (
        <p key={warning.id} className="margin-note mt-2 mb-3">
          {warning.words}
        </p>
      ))}
      <div className="grid gap-x-[26px] gap-y-6 lg:grid-cols-2">
        <div className="min-w-0">
          <Standing view={view} />
        </div>
        {view.schedule.length > 0 && <LoanToValue view={view} />}
        {facts.insurance !== null && (
          <>
            <InsuranceEnds {...props} />
            <InsuranceAsks view={view} />
          </>
        )}
      </div>
      {facts.insurance !== null && (
        <Fold title="Toward the request" summary={checklistSummary(view, gone)} open={!gone}>
          <InsuranceChecklist {...props} />
        </Fold>
      )}
      <Fold
        title="Values and balances"
        summary={`${countWords(facts.appraisals.length, 'value', 'values')}, ${countWords(facts.balances.length, 'statement balance', 'statement balances')}`}
      >
        <div className="grid gap-x-[26px] gap-y-6 lg:grid-cols-2">
          <InsuranceValues {...props} />
          <InsuranceBalances {...props} />
        </div>
      </Fold>
      {facts.insurance !== null && <InsurancePremiums {...props} />}
      <InsuranceSchedule view={view} householdId={props.householdId} />
      <p className="hint mt-3">Not lending advice. Ask the servicer before relying on a day; its records decide.</p>
    </Sheet>
  );
}

function Standing({ view }: { view: MortgageView }) {
  const { facts } = view;
  return (
    <>
      <h3>The mortgage</h3>
      <FactsList
        rows={[
          {
            label: facts.lender === '' ? 'Principal' : facts.lender,
            value: money(facts.principalCents),
            hint: `at ${percentWords(facts.annualRate)} over ${facts.termMonths} months, ${money(view.paymentCents)} a month`,
          },
          {
            label: `Balance on ${fullDate(view.balanceOn)}`,
            value: (
              <MoneyFigure
                title={`Mortgage balance on ${fullDate(view.balanceOn)}`}
                cents={view.balance.amountCents}
                working={view.balance.working}
              />
            ),
          },
          {
            label: 'Original value',
            value: money(facts.originalValueCents),
            hint: `the balance is ${view.originalPercent} % of it`,
          },
          ...(view.latest
            ? [
                {
                  label: `Value on ${fullDate(view.latest.on)}`,
                  value: money(view.latest.valueCents),
                  hint: `the balance is ${view.latest.percent} % of it`,
                },
              ]
            : []),
          ...(view.premiumCents === null
            ? []
            : [
                { label: 'Premium', value: money(view.premiumCents), hint: 'each month, as it is or would be today' },
                { label: 'Avoided so far', value: money(view.avoidedCents), total: true },
              ]),
        ]}
      />
    </>
  );
}

function checklistSummary(view: MortgageView, gone: boolean): string {
  if (gone) return 'for the record: the insurance is gone';
  const ready = view.checklist.filter((line) => line.state === 'ready').length;
  return `${ready} of ${view.checklist.length} ready`;
}

function countWords(count: number, one: string, many: string): string {
  return `${count === 0 ? 'no' : count} ${count === 1 ? one : many}`;
}
