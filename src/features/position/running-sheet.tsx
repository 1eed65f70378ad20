import { useQuery } from '@tanstack/react-query';
import { lazy, Suspense, useMemo, useState } from 'react';
import { Link } from 'react-router-dom';
import type { Position } from '#shared/position/position.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Prose } from '#src/ui/prose.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { usePhone } from '#src/ui/use-media.ts';
import { chartSeries, type Series } from './chart-series.ts';
import { ChartTable } from './chart-table.tsx';
import { chartSummary, rangeMethod, rangeSentence } from './chart-words.ts';
import { outlookQuery } from './outlook-queries.ts';

const Charts = lazy(() => import('./charts.tsx'));

/** "Running net position": the two charts, what they say in one sentence, and their figures as a table. */
export function RunningSheet({ position }: { position: Position }) {
  const phone = usePhone();
  const [whole, setWhole] = useState(false);
  const [table, setTable] = useState(false);
  const outlook = useQuery(outlookQuery(useHousehold().id)).data ?? null;
  const range = outlook?.range ?? null;
  const series = useMemo(() => chartSeries(position, whole, range), [position, whole, range]);
  if (!series) return null;
  const years = Math.round((position.projection?.months.length ?? 0) / 12);
  const summary = range
    ? `${chartSummary(position, series)} ${rangeSentence(range, years)}`
    : chartSummary(position, series);
  const height = phone ? 'h-[230px]' : 'h-[520px]';
  return (
    <Sheet title="Running net position" actions={phone ? undefined : <LineKey isBanded={series.band.length > 0} />}>
      {!phone && (
        <p className="hint mt-0.5">
          Cash so far is every dollar kept or received less every dollar paid. Settled today also pays off the loan and
          collects what is still owed to you. {position.projection ? 'Dashed and hatched: projected.' : ''}
        </p>
      )}
      {!phone && <FlagKey series={series} />}
      <div className="-mx-1 mt-1">
        <Suspense fallback={<div className={`bone ${height}`} aria-busy="true" />}>
          <Charts series={series} summary={summary} phone={phone} />
        </Suspense>
      </div>
      {phone && series.events.length > 0 && <EventList series={series} />}
      <div className="mt-2 flex flex-wrap items-baseline gap-x-5 gap-y-1">
        <p className="hint grow basis-[560px]">
          <Prose text={summary} />
        </p>
        <p className="no-print flex flex-wrap items-baseline gap-x-5 text-[15px]">
          {position.projection && (
            <Link to="try" className="inline-flex min-h-11 items-center sm:min-h-0">
              Try a change
            </Link>
          )}
          {(series.cut || whole) && (
            <button type="button" className="link min-h-11 sm:min-h-0" onClick={() => setWhole(!whole)}>
              {whole ? 'Show less of it' : 'Show the whole projection'}
            </button>
          )}
          <button
            type="button"
            className="link min-h-11 sm:min-h-0"
            aria-expanded={table}
            onClick={() => setTable(!table)}
          >
            {table ? 'Hide the table' : 'Show as table'}
          </button>
        </p>
      </div>
      {position.whyNoProjection && <p className="hint mt-2">{position.whyNoProjection}</p>}
      {range && <p className="hint mt-2">{rangeMethod(range)}</p>}
      {outlook?.whyNoRange && position.projection && <p className="hint mt-2">{outlook.whyNoRange}</p>}
      {table && <ChartTable series={series} />}
    </Sheet>
  );
}

function LineKey({ isBanded }: { isBanded: boolean }) {
  return (
    <span className="hint flex gap-7" aria-hidden="true">
      <span className="whitespace-nowrap">
        <i className="mr-2 inline-block h-[3px] w-[30px] bg-ink align-middle" />
        settled today
      </span>
      <span className="whitespace-nowrap">
        <i className="mr-2 inline-block h-[2px] w-[30px] bg-credit align-middle" />
        cash so far
      </span>
      {isBanded && (
        <span className="whitespace-nowrap">
          <i className="mr-2 inline-block h-[12px] w-[30px] bg-ink/16 align-middle" />8 of 10 futures
        </span>
      )}
    </span>
  );
}

/** The numbered flags in words, above the chart, so that labels never collide. */
function FlagKey({ series }: { series: Series }) {
  if (series.events.length === 0) return null;
  return (
    <ol className="hint mt-1.5 mb-1 flex flex-wrap gap-x-5.5">
      {series.events.map((event) => (
        <li key={event.number} title={event.on}>
          <b className="text-ink">{event.number}</b> {event.label}
        </li>
      ))}
    </ol>
  );
}

function EventList({ series }: { series: Series }) {
  return (
    <details className="mt-2">
      <summary className="hint flex min-h-11 items-center underline underline-offset-3">What happens when</summary>
      <ol>
        {series.events.map((event) => (
          <li key={event.number} className="flex justify-between gap-4 border-b border-rule py-1.5 text-[15px]">
            <span>{event.label}</span>
            <span className="whitespace-nowrap text-soft">{event.on.slice(0, 7)}</span>
          </li>
        ))}
      </ol>
    </details>
  );
}
