import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { MoneyView } from '#shared/api/money.ts';
import { dollars, fullDate } from '#src/lib/format.ts';
import { type HouseholdContext, useHousehold } from '#src/lib/household.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { EmptyState, ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { IncentiveSheet } from './incentive-sheet.tsx';
import { InsuranceSheet } from './insurance-sheet.tsx';
import { LoanSheet } from './loan-sheet.tsx';
import { moneyQuery } from './money-queries.ts';
import { OtherParts } from './other-parts.tsx';

/** Money: the loan, mortgage insurance, the incentive, and every cost and income beside them. */
export function MoneyPage() {
  const household = useHousehold();
  const view = useQuery(moneyQuery(household.id));
  if (view.isPending) return <PageSkeleton />;
  if (view.isError) return <ErrorState error={view.error} retry={() => view.refetch()} />;
  return <Money view={view.data} household={household} />;
}

function Money({ view, household }: { view: MoneyView; household: HouseholdContext }) {
  const given = { householdId: household.id, canEdit: household.canEdit, today: localToday() };
  const base = `/h/${household.id}`;
  return (
    <div className="page">
      <Sentence title="Money" lede={<Lede view={view} />}>
        <Headline view={view} />
      </Sentence>
      <p className="no-print mt-4">
        <ButtonLink to={`${base}/try`} look="plain">
          Try a change
        </ButtonLink>
      </p>
      <div className="grid items-start gap-x-[26px] lg:grid-cols-2">
        <div className="min-w-0">
          {view.loan ? (
            <LoanSheet loan={view.loan} {...given} />
          ) : (
            <NotEntered title="The loan" step="loan" base={base} canEdit={household.canEdit}>
              A loan that pays for the roof is not entered. Paid in cash? Then the cash stands under costs.
            </NotEntered>
          )}
        </div>
        <div className="min-w-0">
          {view.incentive ? (
            <IncentiveSheet incentive={view.incentive} {...given} />
          ) : (
            <NotEntered title="Production incentive" step="incentive" base={base} canEdit={household.canEdit}>
              No incentive per kWh is entered.
            </NotEntered>
          )}
        </div>
      </div>
      {view.insurance ? (
        <InsuranceSheet {...given} />
      ) : (
        <NotEntered title="Mortgage insurance" step="mortgage" base={base} canEdit={household.canEdit}>
          No mortgage is entered, so no insurance is counted.
        </NotEntered>
      )}
      <OtherParts {...given} />
      <p className="foot">
        Computed from what was entered; not lending or tax advice. The servicer’s statements and quotes decide.
      </p>
    </div>
  );
}

function Headline({ view }: { view: MoneyView }) {
  if (!view.loan) return <b>No loan is entered.</b>;
  if (view.loan.payoffCents <= 0) return <b className="pos">The loan is paid off.</b>;
  return (
    <>
      <b>{dollars(view.loan.payoffCents)} still owed</b>, {dollars(view.loan.paymentCents)} a month.
    </>
  );
}

function Lede({ view }: { view: MoneyView }) {
  const parts: string[] = [];
  if (view.loan) {
    parts.push(`${dollars(view.loan.paidCents)} paid so far, ${dollars(view.loan.interestPaidCents)} of it interest.`);
    if (view.loan.lastPaymentOn) parts.push(`The last payment falls on ${fullDate(view.loan.lastPaymentOn)}.`);
  }
  if (view.incentive && view.incentive.owedCents > 0) {
    parts.push(`The incentive owes you ${dollars(view.incentive.owedCents)}.`);
  }
  return parts.join(' ');
}

function NotEntered({
  title,
  step,
  base,
  canEdit,
  children,
}: {
  title: string;
  step: string;
  base: string;
  canEdit: boolean;
  children: ReactNode;
}) {
  return (
    <EmptyState
      title={title}
      action={
        canEdit && (
          <ButtonLink to={`${base}/setup/${step}`} look="plain">
            Enter it
          </ButtonLink>
        )
      }
    >
      {children}
    </EmptyState>
  );
}

/** Today where the reader is, as the first proposal of a date field. */
function localToday(): string {
  const now = new Date();
  return `${now.getFullYear()}-${String(now.getMonth() + 1).padStart(2, '0')}-${String(now.getDate()).padStart(2, '0')}`;
}
