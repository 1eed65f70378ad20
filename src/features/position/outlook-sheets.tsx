import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { Carbon, Handbook, HandbookColumn, PlainFigure } from '#shared/position/outlook.ts';
import type { Position } from '#shared/position/position.ts';
import { decimal } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Sheet } from '#src/ui/sheet.tsx';
import { ErrorState } from '#src/ui/states.tsx';
import { FigureButton } from '#src/ui/working.tsx';
import { AssumptionsDialog } from './assumptions-dialog.tsx';
import { outlookQuery } from './outlook-queries.ts';
import { figureWords, type HandbookRow, handbookRows, plainWords } from './outlook-words.ts';

/** What the projection comes to in the figures of the handbooks, the carbon, and what it all takes for granted. */
export function OutlookSheets({ position }: { position: Position }) {
  const household = useHousehold();
  const outlook = useQuery(outlookQuery(household.id));
  const [editing, setEditing] = useState(false);
  if (outlook.isPending) return <div className="sheet bone h-[320px]" aria-busy="true" />;
  if (outlook.isError) return <ErrorState error={outlook.error} retry={() => outlook.refetch()} />;
  const { handbook, carbon, assumptions } = outlook.data;
  return (
    <>
      {handbook && <HandbookSheet handbook={handbook} />}
      {carbon && <CarbonSheet carbon={carbon} />}
      <Sheet
        title="Assumptions"
        hint="What the projection, the range and the figures above take for granted. Changing one changes nothing of the record."
        actions={
          household.canEdit && (
            <button type="button" className="link no-print min-h-11 sm:min-h-0" onClick={() => setEditing(true)}>
              Change the assumptions
            </button>
          )
        }
      >
        <AssumptionList position={position} />
      </Sheet>
      {editing && (
        <AssumptionsDialog householdId={household.id} assumptions={assumptions} onClose={() => setEditing(false)} />
      )}
    </>
  );
}

function HandbookSheet({ handbook }: { handbook: Handbook }) {
  const columns: { head: string; column: HandbookColumn }[] = [{ head: 'As bought', column: handbook.asBought }];
  if (handbook.asCash) columns.push({ head: 'As if cash', column: handbook.asCash });
  return (
    <Sheet
      title="Handbook figures"
      hint={`The record so far and the projection after it, ${handbook.years} years in all, as yearly sums. None of these is advice.`}
    >
      <table className="ruled ruled-stack">
        <thead>
          <tr>
            <td />
            {columns.map(({ head }) => (
              <th key={head} scope="col">
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {handbookRows(handbook.discountRate).map((row) => (
            <tr key={row.key}>
              <th scope="row">
                {row.label}
                <span className="hint block font-normal">{row.meaning}</span>
              </th>
              {columns.map(({ head, column }) => (
                <td key={head} data-label={head}>
                  <HandbookCell row={row} column={column} head={head} />
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      <p className="hint mt-2">
        As bought counts the payments to the lender as they fall.
        {handbook.asCash &&
          ' With a loan little is paid at the start, so payback and rate of return as bought say more of the loan than of the roof. As if cash puts the loan’s principal less the dealer’s fee at the start and no payments after it.'}
        {handbook.estimatedCycles > 0 &&
          ` Production of ${handbook.estimatedCycles} ${handbook.estimatedCycles === 1 ? 'cycle is' : 'cycles are'} not known and estimated in the cost per kWh.`}
      </p>
    </Sheet>
  );
}

function HandbookCell({ row, column, head }: { row: HandbookRow; column: HandbookColumn; head: string }) {
  const text = figureWords(column, row.key);
  const figure = column[row.key];
  if (text === null || figure === null) return <span className="text-soft">{row.none}</span>;
  return <FigureButton title={`${row.label}, ${head.toLowerCase()}`} text={text} working={figure.working} />;
}

function CarbonSheet({ carbon }: { carbon: Carbon }) {
  const { factor, toDate, projected, missingCycles } = carbon;
  return (
    <Sheet title="Carbon not emitted">
      <p>
        {toDate ? <CarbonFigure title="CO₂ not emitted, to date" figure={toDate} /> : 'Not known yet'} of CO₂ to date
        {projected && (
          <>
            , and <CarbonFigure title="CO₂ not emitted, projected" figure={projected} /> more to the horizon, an
            estimate
          </>
        )}
        .
      </p>
      <p className="hint mt-1">
        At {decimal(factor.lbPerMwh)} pounds per MWh: {factor.region}, {factor.basis}, {factor.year}. The grid’s own mix
        will change; the factor stays.
        {missingCycles > 0 &&
          ` ${missingCycles} ${missingCycles === 1 ? 'cycle' : 'cycles'} without production ${missingCycles === 1 ? 'is' : 'are'} not counted.`}
      </p>
    </Sheet>
  );
}

function CarbonFigure({ title, figure }: { title: string; figure: PlainFigure }) {
  return <FigureButton title={title} text={plainWords(figure)} working={figure.working} />;
}

function AssumptionList({ position }: { position: Position }) {
  const stated = position.projection?.assumptions ?? [];
  return (
    <table className="ruled ruled-stack">
      <thead className="visually-hidden">
        <tr>
          <th scope="col">Assumption</th>
          <th scope="col">Value</th>
          <th scope="col">Source</th>
        </tr>
      </thead>
      <tbody>
        {stated.map((row) => (
          <tr key={row.name}>
            <th scope="row">{row.label}</th>
            <td className="text-left!" data-label="Value">
              {row.value}
            </td>
            <td className="text-left! text-soft" data-label="Source">
              {row.source}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
