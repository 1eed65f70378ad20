import { useQuery } from '@tanstack/react-query';
import { Fragment, lazy, Suspense } from 'react';
import type { PositionView } from '#shared/api/position.ts';
import { longDayMonth, monthYear } from '#src/lib/format.ts';
import { type HouseholdContext, useHousehold } from '#src/lib/household.ts';
import { Sentence } from '#src/ui/sentence.tsx';
import { ErrorState, PageSkeleton } from '#src/ui/states.tsx';
import { usePhone } from '#src/ui/use-media.ts';
import { AddsUpSheet } from './adds-up-sheet.tsx';
import { NeedNotes, NeedsList } from './needs-list.tsx';
import { positionQuery } from './position-queries.ts';
import { countWords, standing } from './position-words.ts';

// The sentence and the table come first; the chart's sheet and Chart.js follow, both asked for at once.
const RunningSheet = lazy(async () => {
  void import('./charts.tsx');
  return { default: (await import('./running-sheet.tsx')).RunningSheet };
});
const OutlookSheets = lazy(async () => ({ default: (await import('./outlook-sheets.tsx')).OutlookSheets }));
const FirstUse = lazy(async () => ({ default: (await import('./first-use.tsx')).FirstUse }));

/** Position: is the roof paying for itself, and can every figure be proved? */
export function PositionPage() {
  const household = useHousehold();
  const view = useQuery(positionQuery(household.id));
  if (view.isPending) return <PageSkeleton />;
  if (view.isError) return <ErrorState error={view.error} retry={() => view.refetch()} />;
  return view.data.lastCycle === null ? (
    <Suspense fallback={<PageSkeleton />}>
      <FirstUse view={view.data} household={household} />
    </Suspense>
  ) : (
    <Standing view={view.data} household={household} lastCycleTo={view.data.lastCycle.to} />
  );
}

const TONES = { ahead: 'pos', behind: 'neg', plain: '' };

function Standing({
  view,
  household,
  lastCycleTo,
}: {
  view: PositionView;
  household: HouseholdContext;
  lastCycleTo: NonNullable<PositionView['lastCycle']>['to'];
}) {
  const { position } = view;
  const base = `/h/${household.id}`;
  const phone = usePhone();
  // On a phone what is wrong stands under the sentence, as the list would come after two screens.
  const wrong = view.needs.filter((need) => need.tone === 'bad');
  const listed = phone ? view.needs.filter((need) => need.tone !== 'bad') : view.needs;
  const unfinished = household.canEdit ? view.unfinishedSteps : [];
  const nothingLeft = wrong.length > 0 && listed.length === 0 && unfinished.length === 0;
  return (
    <div className="page">
      <Sentence title="Position" lede={<Lede view={view} lastCycleTo={lastCycleTo} />}>
        {standing(position).map((part) =>
          part.tone === 'plain' ? (
            <Fragment key={part.text}>{part.text}</Fragment>
          ) : (
            <b key={part.text} className={TONES[part.tone]}>
              {part.text}
            </b>
          ),
        )}
      </Sentence>
      {view.sample && <p className="hint mt-2">A sample household. Nothing here is real.</p>}
      {phone && wrong.length > 0 && (
        <div className="mt-5">
          <NeedNotes needs={wrong} base={base} />
        </div>
      )}
      <Suspense
        fallback={
          <section className="sheet" aria-busy="true">
            <div className={phone ? 'bone h-[300px]' : 'bone h-[640px]'} />
          </section>
        }
      >
        <RunningSheet position={position} />
      </Suspense>
      <div className="grid gap-x-[26px] lg:grid-cols-[minmax(0,1fr)_300px]">
        <AddsUpSheet position={position} />
        <div className="mt-8 lg:mt-[48px] lg:pl-1.5">
          {!nothingLeft && <NeedsList needs={listed} unfinished={unfinished} base={base} />}
        </div>
      </div>
      <Suspense fallback={<div className="sheet bone h-[320px]" aria-busy="true" />}>
        <OutlookSheets position={position} />
      </Suspense>
      <p className="foot">
        Figures come from your own documents. They are not tax, legal or lending advice; confirm with your preparer,
        servicer and utility.
      </p>
    </div>
  );
}

function Lede({
  view,
  lastCycleTo,
}: {
  view: PositionView;
  lastCycleTo: NonNullable<PositionView['lastCycle']>['to'];
}) {
  const { projection, points } = view.position;
  const even = projection?.evenOn ?? null;
  const years = projection ? Math.round(projection.months.length / 12) : 0;
  const counts = countWords(view.counts);
  return (
    <>
      {even && even > lastCycleTo && (
        <>
          At this pace the roof has paid for itself in <b>{monthYear(even)}</b>.{' '}
        </>
      )}
      {projection && even === null && <>Not even within the {years} years projected. </>}
      Bills are counted to {longDayMonth(lastCycleTo)}
      {counts === '' ? '.' : `; ${counts}.`}
      {points.length > 0 && view.position.pace === null && ' The pace shows after two cycles.'}
    </>
  );
}
