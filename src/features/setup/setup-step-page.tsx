import { useQuery } from '@tanstack/react-query';
import { type ComponentType, useEffect } from 'react';
import { Link, Navigate, useParams } from 'react-router-dom';
import { SETUP_STEPS, type SetupStep, type SetupView, setupStep } from '#shared/api/setup.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Sentence } from '#src/ui/sentence.tsx';
import { ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { setupQuery } from './setup-queries.ts';
import { BeforeStep } from './step-before.tsx';
import { CashStep } from './step-cash.tsx';
import { CreditStep } from './step-credit.tsx';
import { HouseStep } from './step-house.tsx';
import { IncentiveStep } from './step-incentive.tsx';
import { LoanStep } from './step-loan.tsx';
import { MortgageStep } from './step-mortgage.tsx';
import { PlanStep } from './step-plan.tsx';
import { RoofStep } from './step-roof.tsx';
import { STEP_WORDS } from './steps.ts';

const STEPS: Record<SetupStep, ComponentType<{ view: SetupView }>> = {
  house: HouseStep,
  roof: RoofStep,
  plan: PlanStep,
  before: BeforeStep,
  loan: LoanStep,
  mortgage: MortgageStep,
  credit: CreditStep,
  incentive: IncentiveStep,
  cash: CashStep,
};

export function SetupStepPage() {
  const { id, canEdit } = useHousehold();
  const { step: named } = useParams();
  const setup = useQuery(setupQuery(id));
  const parsed = setupStep.safeParse(named);
  useEffect(() => {
    window.scrollTo(0, 0);
  }, []);
  if (!parsed.success) return <Navigate to={`/h/${id}/setup`} replace />;
  if (setup.isPending) return <PageSkeleton />;
  if (setup.isError) return <ErrorState error={setup.error} retry={() => setup.refetch()} />;
  const step = parsed.data;
  const words = STEP_WORDS[step];
  const Fields = STEPS[step];
  return (
    <div className="page page-narrow">
      <p className="mb-4 flex flex-wrap justify-between gap-x-6 text-[15px]">
        <Link className="link" to={`/h/${id}/setup`}>
          All of set-up
        </Link>
        <span className="text-soft">
          Step {SETUP_STEPS.indexOf(step) + 1} of {SETUP_STEPS.length}
        </span>
      </p>
      <Sentence title={words.title} lede={words.lede}>
        <b>{words.title}</b>
      </Sentence>
      {!canEdit && <p className="hint mt-4">Only an owner changes this. It is shown to you as stated.</p>}
      {/* A form starts anew on each step, filled in with what is stated. */}
      <Fields key={step} view={setup.data} />
      {words.caution && <p className="foot">{words.caution}</p>}
    </div>
  );
}
