import { useQuery } from '@tanstack/react-query';
import { lazy, Suspense } from 'react';
import { Link, useNavigate, useParams, useSearchParams } from 'react-router-dom';
import type { CycleView } from '#shared/api/cycles.ts';
import type { Cycle } from '#shared/ledger/cycle.ts';
import { cycleSentence } from '#shared/ledger/sentences.ts';
import { cycleRange } from '#src/lib/format.ts';
import { type HouseholdContext, useHousehold } from '#src/lib/household.ts';
import { Prose } from '#src/ui/prose.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { AgainstLoan } from './against-loan.tsx';
import { ChecksSheet } from './checks-sheet.tsx';
import { cycleQuery } from './cycles-queries.ts';
import { EnergySheet } from './energy-sheet.tsx';
import { FacingSheet } from './facing-sheet.tsx';
import { PapersSheet } from './papers-sheet.tsx';

const CorrectStatement = lazy(() => import('./correct-statement.tsx'));

/** A cycle: where the energy went, the bill beside the meters, what it added, and whether it agrees. */
export function CyclePage() {
  const household = useHousehold();
  const { to = '' } = useParams();
  const view = useQuery(cycleQuery(household.id, to));
  if (view.isPending) return <PageSkeleton />;
  if (view.isError) return <ErrorState error={view.error} retry={() => view.refetch()} />;
  return <CycleBody key={to} view={view.data} household={household} />;
}

function CycleBody({ view, household }: { view: CycleView; household: HouseholdContext }) {
  const { cycle } = view;
  const base = `/h/${household.id}`;
  const [search, setSearch] = useSearchParams();
  const navigate = useNavigate();
  const correcting = household.canEdit && search.has('correct');
  return (
    <div className="page">
      <Neighbours view={view} base={base} />
      <Sentence title={`Cycle ${cycleRange(cycle.from, cycle.to)}`} lede={<Lede cycle={cycle} />}>
        <b>{cycleRange(cycle.from, cycle.to)}</b>
        {cycle.from.slice(0, 4) === cycle.to.slice(0, 4) && ` ${cycle.to.slice(0, 4)}`}, {cycle.days} days
      </Sentence>
      <Standing cycle={cycle} />
      {correcting ? (
        <Suspense fallback={<div className="sheet bone h-96" aria-busy="true" />}>
          <CorrectStatement
            statement={cycle.statement}
            householdId={household.id}
            cycleTo={cycle.to}
            onCancel={() => setSearch({}, { replace: true })}
            onDone={(to) => navigate(`${base}/cycles/${to}`, { replace: true })}
          />
        </Suspense>
      ) : (
        <>
          <EnergySheet cycle={cycle} />
          <FacingSheet cycle={cycle} household={household} onCorrect={() => setSearch({ correct: '' })} />
          <div className="grid items-start gap-x-[26px] lg:grid-cols-2">
            <div className="min-w-0">
              <AgainstLoan cycle={cycle} />
              <PapersSheet view={view} />
            </div>
            <ChecksSheet cycle={cycle} household={household} />
          </div>
        </>
      )}
    </div>
  );
}

function Neighbours({ view, base }: { view: CycleView; base: string }) {
  return (
    <nav aria-label="Cycles beside this one" className="no-print mb-1 flex flex-wrap gap-x-6 text-[15px] text-soft">
      {view.previousTo && view.previousLabel && (
        <Link to={`${base}/cycles/${view.previousTo}`} className="flex min-h-9 items-center hover:text-ink">
          ‹ {cycleRange(view.previousLabel.from, view.previousLabel.to)}
        </Link>
      )}
      {view.nextTo && view.nextLabel && (
        <Link to={`${base}/cycles/${view.nextTo}`} className="flex min-h-9 items-center hover:text-ink">
          {cycleRange(view.nextLabel.from, view.nextLabel.to)} ›
        </Link>
      )}
      <Link to={`${base}/cycles`} className="flex min-h-9 items-center hover:text-ink">
        All cycles
      </Link>
    </nav>
  );
}

const TONES = { plain: undefined, strong: undefined, ahead: 'pos', behind: 'neg' };

function Lede({ cycle }: { cycle: Cycle }) {
  return cycleSentence(cycle).map((part, index) =>
    part.tone === 'plain' ? (
      // biome-ignore lint/suspicious/noArrayIndexKey: the parts of one sentence never move
      <Prose key={index} text={part.text} />
    ) : (
      // biome-ignore lint/suspicious/noArrayIndexKey: the parts of one sentence never move
      <b key={index} className={TONES[part.tone]}>
        {part.text}
      </b>
    ),
  );
}

/** What a reader must know before trusting the figures, where the sentence has not said it. */
function Standing({ cycle }: { cycle: Cycle }) {
  const notes: string[] = [];
  if (cycle.provisional && cycle.state !== 'open') {
    notes.push('Provisional: a read is estimated, and the next actual read settles both cycles.');
  }
  if (cycle.split && cycle.state !== 'balanced') {
    notes.push('The first statement is split at switch-on; the figures of this cycle are estimates.');
  }
  if (cycle.entries.some((entry) => entry.estimated && entry.basis !== 'memo') && !cycle.split) {
    notes.push('Some of what is added here is an estimate.');
  }
  return notes.length === 0 ? null : <p className="hint mt-2">{notes.join(' ')}</p>;
}
