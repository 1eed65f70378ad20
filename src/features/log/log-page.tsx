import { useQuery } from '@tanstack/react-query';
import { Link, useLocation, useNavigate, useSearchParams } from 'react-router-dom';
import { type LogDraft, type PostedView, postedView } from '#shared/api/log.ts';
import { useHousehold } from '#src/lib/household.ts';
import { ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { CheckStep } from './check-step.tsx';
import { logQuery } from './log-queries.ts';
import { PapersStep } from './papers-step.tsx';
import { PostedStep } from './posted-step.tsx';

type StepName = 'papers' | 'check' | 'posted';

export function LogPage() {
  const { id } = useHousehold();
  const draft = useQuery(logQuery(id));
  if (draft.isPending) return <PageSkeleton />;
  if (draft.isError && !draft.data) return <ErrorState error={draft.error} retry={() => draft.refetch()} />;
  return <Steps draft={draft.data} />;
}

/** Papers, Check and Posted. The step stands in the address; what was posted travels with the place, so that a reload shows it again. */
function Steps({ draft }: { draft: LogDraft }) {
  const [search, setSearch] = useSearchParams();
  const location = useLocation();
  const navigate = useNavigate();
  const posted = postedView.safeParse(location.state);
  const asked = search.get('step');
  const hasPapers = draft.statements.length > 0 || draft.readings.length > 0;
  const step: StepName =
    asked === 'posted' && posted.success ? 'posted' : asked === 'check' && hasPapers ? 'check' : 'papers';
  const go = (to: StepName) => setSearch(to === 'papers' ? {} : { step: to });
  const show = (view: PostedView) => navigate('?step=posted', { replace: true, state: view });
  return (
    <div className="page">
      <nav aria-label="Steps of logging a month" className="mb-4 flex flex-wrap items-center justify-between gap-x-7">
        <ol className="flex gap-7">
          <StepLink name="Papers" to="?" here={step === 'papers'} open />
          <StepLink name="Check" to="?step=check" here={step === 'check'} open={hasPapers} />
          <StepLink name="Posted" to="?step=posted" here={step === 'posted'} open={false} />
        </ol>
        {hasPapers && step !== 'posted' && (
          <Link to=".." relative="path" className="flex min-h-11 items-center text-[15px]">
            Keep for later
          </Link>
        )}
      </nav>
      {step === 'papers' && <PapersStep draft={draft} onCheck={() => go('check')} />}
      {step === 'check' && <CheckStep draft={draft} onPosted={show} onPapers={() => go('papers')} />}
      {step === 'posted' && posted.success && <PostedStep posted={posted.data} />}
    </div>
  );
}

function StepLink({ name, to, here, open }: { name: string; to: string; here: boolean; open: boolean }) {
  const look = `flex min-h-11 items-center border-b-[3px] no-underline ${here ? 'border-accent font-semibold' : 'border-transparent text-soft'}`;
  return (
    <li>
      {open && !here ? (
        <Link to={to} className={look}>
          {name}
        </Link>
      ) : (
        <span className={look} aria-current={here ? 'step' : undefined}>
          {name}
        </span>
      )}
    </li>
  );
}
