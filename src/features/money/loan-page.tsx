import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { LoanView } from '#shared/api/money-loan.ts';
import { type Cents, cents } from '#shared/units/cents.ts';
import { dollars, fullDate, money, monthYear } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { Note } from '#src/ui/note.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { EmptyState, ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { LoanBalances } from './loan-balances.tsx';
import { LoanContract } from './loan-contract.tsx';
import { LoanFigures } from './loan-figures.tsx';
import { LoanOutcomes } from './loan-outcomes.tsx';
import { LoanPayments } from './loan-payments.tsx';
import { LoanPayoff } from './loan-payoff.tsx';
import type { LoanProps } from './loan-props.ts';
import { loanQuery } from './loan-queries.ts';
import { LoanRefinances } from './loan-refinances.tsx';
import { LoanSchedule } from './loan-schedule.tsx';

/** The loan, whole: what is owed and until when, what it costs, the contract, the record, the schedule. */
export function LoanPage() {
  const household = useHousehold();
  const view = useQuery(loanQuery(household.id));
  if (view.isPending) return <PageSkeleton />;
  if (view.isError) return <ErrorState error={view.error} retry={() => view.refetch()} />;
  const { loan } = view.data;
  if (loan === null) return <NoLoan householdId={household.id} canEdit={household.canEdit} />;
  return <Loan loan={loan} householdId={household.id} canEdit={household.canEdit} today={loan.payoffOn} />;
}

function NoLoan({ householdId, canEdit }: { householdId: string; canEdit: boolean }) {
  return (
    <div className="page">
      <Sentence title="The loan">
        <b>No loan is entered.</b>
      </Sentence>
      <EmptyState
        title="The loan"
        action={
          canEdit && (
            <ButtonLink to={`/h/${householdId}/setup/loan`} look="plain">
              Enter it
            </ButtonLink>
          )
        }
      >
        A loan that pays for the roof is not entered. Paid in cash? Then the cash stands under costs.
      </EmptyState>
    </div>
  );
}

function Loan(props: LoanProps) {
  const { loan, householdId } = props;
  return (
    <div className="page">
      <p className="no-print mb-2">
        <Link
          className="hint inline-flex min-h-11 items-center underline underline-offset-3"
          to={`/h/${householdId}/money`}
        >
          Money
        </Link>
      </p>
      <Sentence title="The loan" lede={lede(loan)}>
        <Headline loan={loan} />
      </Sentence>
      <PrepaymentNote {...props} />
      <div className="grid items-start gap-x-[26px] lg:grid-cols-2">
        <LoanFigures {...props} />
        <div className="min-w-0">
          <LoanPayoff {...props} />
          <LoanContract {...props} />
        </div>
      </div>
      <LoanOutcomes {...props} />
      <LoanSchedule {...props} />
      <div className="grid items-start gap-x-[26px] lg:grid-cols-2">
        <LoanPayments {...props} />
        <div className="min-w-0">
          <LoanBalances {...props} />
          <LoanRefinances {...props} />
        </div>
      </div>
      <p className="foot">
        Computed from what was entered; not lending advice. Daily interest never meets a schedule to the cent: the
        servicer’s statements and quotes decide.
      </p>
    </div>
  );
}

function Headline({ loan }: { loan: LoanView }) {
  if (loan.payoff.amountCents <= 0) return <b className="pos">The loan is paid off.</b>;
  return (
    <>
      <b>{dollars(loan.payoff.amountCents)} still owed</b>
      {loan.clearedOn && `, paid off by ${monthYear(loan.clearedOn)}`}.
    </>
  );
}

function lede(loan: LoanView): string {
  const parts: string[] = [];
  if (loan.next)
    parts.push(`The next payment is ${money(loan.next.payment.amountCents)} on ${fullDate(loan.next.on)}.`);
  parts.push(`${dollars(cents(-loan.paid.amountCents))} paid so far, ${dollars(loan.interestPaidCents)} interest.`);
  return parts.join(' ');
}

/** The prepayment a contract takes for granted, while it can still be made. */
function PrepaymentNote({ loan, today }: LoanProps) {
  const [whole, , nothing] = loan.outcomes;
  if (!loan.prepaymentOn || loan.prepaymentOn < today || !whole?.next || !nothing?.next) return null;
  const rise: Cents = cents(nothing.next.amountCents - whole.next.amountCents);
  return (
    <div className="mt-5">
      <Note title={`${money(whole.prepaidCents)} is taken for granted by ${fullDate(loan.prepaymentOn)}`}>
        {' '}
        Unpaid, the payment rises by {money(rise)} a month. Nobody is bound to pay it; the contract says how it is
        applied.
      </Note>
    </div>
  );
}
