import { useState } from 'react';
import type { DraftReadings } from '#shared/api/log.ts';
import type { IntervalChannel } from '#shared/facts/papers.ts';
import { fullDate, kwh } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { countOf } from './counts.ts';
import { useRemoveFile } from './log-queries.ts';
import { MappingForm } from './mapping-form.tsx';
import { UnreadRows } from './unread-rows.tsx';

export const CHANNEL_NAMES: Record<IntervalChannel, string> = {
  production: 'Production meter',
  monitor: 'Inverter monitoring',
  import: 'Bought',
  export: 'Sent out',
};

/** How many rows of the file are shown beside the mapping. */
const ROWS_SHOWN = 6;

/** A readings file: what was made of it, what is in doubt, its first rows, and how it is read. */
export function ReadingsSheet({ readings }: { readings: DraftReadings }) {
  const { id } = useHousehold();
  const remove = useRemoveFile(id);
  const [changing, setChanging] = useState(false);
  const { mapping, doubts } = readings;
  return (
    <Sheet
      title={readings.fileName}
      hint={`${CHANNEL_NAMES[mapping.channel]}${readings.minutes === null ? '' : `, ${stepWords(readings.minutes)}`}`}
      actions={
        <Button look="link" busy={remove.isPending} onClick={() => remove.mutate(readings.documentId)}>
          Take the file out
        </Button>
      }
    >
      <Summary readings={readings} />
      {(readings.rejectedRows > 0 || readings.faults.length > 0) && <Rejected readings={readings} />}
      <FirstRows readings={readings} />
      {doubts.length > 0 && (
        <ul className="mt-4">
          {doubts.map((doubt) => (
            <li key={`${doubt.field} ${doubt.message}`} className="border-l-3 border-doubt-rule bg-doubt px-3 py-1.5">
              {doubt.message}
            </li>
          ))}
        </ul>
      )}
      <p className="mt-4">
        <button type="button" className="link min-h-11" aria-expanded={changing} onClick={() => setChanging(!changing)}>
          {changing ? 'Close' : doubts.length > 0 ? 'Say how it is read' : 'Change how it is read'}
        </button>
      </p>
      {changing && <MappingForm key={JSON.stringify(mapping)} readings={readings} />}
      {remove.isError && <p className="field-error">{errorWords(remove.error)}</p>}
    </Sheet>
  );
}

function Summary({ readings }: { readings: DraftReadings }) {
  const { firstDay, lastDay, totalWh, statedTotalWh, overlap } = readings;
  if (firstDay === null || lastDay === null) return <p>No reading could be used. Say how the file is read, below.</p>;
  const rest = [
    readings.missingSteps > 0 ? `${countOf(readings.missingSteps, 'reading')} missing` : null,
    readings.clippedNegativeWh > 0
      ? `${kwh(readings.clippedNegativeWh)} kWh of negative readings counted as nothing`
      : null,
    statedTotalWh !== null ? `the file’s own total says ${kwh(statedTotalWh)} kWh` : null,
    overlap.sameDays > 0 ? `${countOf(overlap.sameDays, 'day')} here already with the same values` : null,
  ].filter((part) => part !== null);
  return (
    <>
      <p>
        <b>{kwh(totalWh)} kWh</b> from {fullDate(firstDay)} to {fullDate(lastDay)},{' '}
        {countOf(readings.acceptedRows, 'row')}.
      </p>
      {rest.length > 0 && <p className="hint">{upper(rest.join('; '))}.</p>}
      {overlap.differentDays.length > 0 && (
        <div className="margin-note bad mt-3 mb-0!">
          <b>{countOf(overlap.differentDays.length, 'day')} here already with other values</b>
          <span>
            The first is {fullDate(overlap.differentDays[0] ?? firstDay)}. You decide on the next page which values
            stand; they are not added up. If this is another meter of the same kind, take the file out, put both meters
            into one file, their kWh added for each time, and choose that.
          </span>
        </div>
      )}
    </>
  );
}

function Rejected({ readings }: { readings: DraftReadings }) {
  return (
    <UnreadRows
      file={readings}
      faults={readings.faults}
      bad={Math.max(readings.rejectedRows, new Set(readings.faults.map((fault) => fault.row)).size)}
      good={readings.acceptedRows}
      advice="Say below how the file is read, correct the file and choose it again, or go on with the rows that can be read."
    />
  );
}

/** The head of the file with the columns that are read set off. */
function FirstRows({ readings }: { readings: DraftReadings }) {
  const { table, mapping } = readings;
  const used = new Map([
    [mapping.timeColumn, mapping.clockColumn === null ? 'time' : 'date'],
    [mapping.energyColumn, 'energy'],
  ]);
  if (mapping.clockColumn !== null) used.set(mapping.clockColumn, 'time');
  const header = table.header.length > 0 ? table.header : readings.columns;
  const rows = table.rows.slice(0, ROWS_SHOWN);
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a box that scrolls must be reachable by keyboard
    <section className="mt-4 overflow-x-auto" tabIndex={0} aria-label={`First rows of ${readings.fileName}`}>
      <table className="w-full border-collapse text-[14.5px]">
        <thead>
          <tr className="border-b-2 border-ink text-left">
            <th className="w-10 pr-3 font-normal text-soft">row</th>
            {header.map((name, index) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: columns are known by their place
              <th key={index} className={`px-3 py-1.5 align-bottom font-semibold ${used.has(index) ? 'bg-doubt' : ''}`}>
                {name || `Column ${index + 1}`}
                {used.has(index) && <span className="block font-normal text-soft">read as {used.get(index)}</span>}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.row} className="border-b border-rule">
              <td className="pr-3 text-soft">{row.row}</td>
              {header.map((_, index) => (
                // biome-ignore lint/suspicious/noArrayIndexKey: columns are known by their place
                <td key={index} className={`px-3 py-1 whitespace-nowrap ${used.has(index) ? 'bg-doubt' : ''}`}>
                  {row.cells[index] ?? ''}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

function stepWords(minutes: number): string {
  if (minutes === 1440) return 'one figure a day';
  return minutes === 60 ? 'hourly' : `every ${minutes} minutes`;
}

const upper = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
