import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { SetupView } from '#shared/api/setup.ts';
import { useHousehold } from '#src/lib/household.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { setupQuery } from './setup-queries.ts';
import { NEEDED_FIRST, STATE_WORDS, STEP_WORDS } from './steps.ts';

export function SetupPage() {
  const { id, canEdit } = useHousehold();
  const setup = useQuery(setupQuery(id));
  if (setup.isPending) return <PageSkeleton />;
  if (setup.isError) return <ErrorState error={setup.error} retry={() => setup.refetch()} />;
  return <TaskList view={setup.data} canEdit={canEdit} />;
}

const NUMBERS = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine'];

function TaskList({ view, canEdit }: { view: SetupView; canEdit: boolean }) {
  const done = view.steps.filter((step) => step.state === 'done').length;
  const left = view.steps.length - done;
  const ready = NEEDED_FIRST.every((step) => view.steps.some((one) => one.step === step && one.state === 'done'));
  const next = view.steps.find((one) => one.state === 'open');
  return (
    <div className="page max-w-[860px]">
      <Sentence title="Set-up" lede={lede(ready, left, canEdit)}>
        {left === 0 ? (
          <>
            <b>All nine parts</b> are set up.
          </>
        ) : (
          <>
            <b>{done === 0 ? 'Nine short steps' : `${upper(NUMBERS[done] ?? String(done))} of nine`}</b>
            {done === 0 ? ', in any order.' : ` set up, ${NUMBERS[left] ?? left} to go.`}
          </>
        )}
      </Sentence>
      {canEdit && (
        <p className="mt-5 flex flex-wrap gap-3">
          {ready && (
            <ButtonLink to="../log">{view.steps.length === done ? 'Log a month' : 'Log the first month'}</ButtonLink>
          )}
          {next && (
            <ButtonLink to={next.step} look={ready ? 'plain' : 'main'}>
              {done === 0
                ? `Begin with ${lower(STEP_WORDS[next.step].title)}`
                : `Go on with ${lower(STEP_WORDS[next.step].title)}`}
            </ButtonLink>
          )}
        </p>
      )}
      <ol className="mt-7 border-t-2 border-ink">
        {view.steps.map(({ step, state }, index) => (
          <li key={step} className="border-b border-rule">
            <Link
              to={step}
              className="grid min-h-11 grid-cols-[28px_1fr_auto] items-baseline gap-x-3 py-3 no-underline hover:bg-sheet"
            >
              <span className="text-soft">{index + 1}</span>
              <span>
                <span className="font-semibold underline">{STEP_WORDS[step].title}</span>
                <span className="hint block">{STEP_WORDS[step].why}</span>
              </span>
              <span className={`text-right ${state === 'done' ? 'mark-ok' : 'mark-wait'}`}>
                {STATE_WORDS[state]}
                <span className="hint hidden font-normal sm:block">{STEP_WORDS[step].leadsTo}</span>
              </span>
            </Link>
          </li>
        ))}
      </ol>
      <p className="foot">Everything can be changed later; figures are worked out again from what you state here.</p>
    </div>
  );
}

function lede(ready: boolean, left: number, canEdit: boolean): string {
  if (!canEdit) return 'What this house has stated. Only an owner changes it.';
  if (left === 0) return 'Change a part whenever the papers change.';
  if (ready) return 'There is enough to log a month. The other parts make the position whole.';
  return 'Each says why it asks. The house, the roof and the rate plan come first; the rest can wait.';
}

const upper = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
const lower = (text: string) => text.charAt(0).toLowerCase() + text.slice(1);
