import { useState } from 'react';
import type { Cycle, FacingLine } from '#shared/ledger/cycle.ts';
import { dayMonth, fullDate } from '#src/lib/format.ts';
import type { HouseholdContext } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Money } from '#src/ui/money.tsx';
import { usePhone } from '#src/ui/use-media.ts';
import { AcceptDialog } from './accept-dialog.tsx';
import { lineVerdict, quantityWords, rateWords } from './line-words.ts';
import { placeWords } from './paper-words.ts';

/** The facing pages: what the utility billed on the left, what the meters say on the right, the verdict between them on one line. */
export function FacingSheet({
  cycle,
  household,
  onCorrect,
}: {
  cycle: Cycle;
  household: HouseholdContext;
  onCorrect: () => void;
}) {
  const phone = usePhone();
  const [accepting, setAccepting] = useState(false);
  const open = cycle.checks.filter((check) => check.verdict === 'differs' && check.accepted === null);
  return (
    <section className="sheet">
      {phone ? <FacingBlocks cycle={cycle} /> : <FacingTable cycle={cycle} />}
      {cycle.whyNotSettled && <p className="mt-3">{cycle.whyNotSettled}</p>}
      {household.canEdit && (
        <p className="no-print mt-4 flex flex-wrap items-center gap-x-5 gap-y-2">
          {open.length > 0 && <Button onClick={() => setAccepting(true)}>Accept with a note</Button>}
          <Button look={open.length > 0 ? 'link' : 'plain'} onClick={onCorrect}>
            Correct the statement
          </Button>
        </p>
      )}
      {accepting && (
        <AcceptDialog checks={open} householdId={household.id} cycleTo={cycle.to} onClose={() => setAccepting(false)} />
      )}
    </section>
  );
}

const BILLED_TITLE = 'What the utility billed';
const OURS_TITLE = 'What your meters say';

function FacingTable({ cycle }: { cycle: Cycle }) {
  const quantityHead = cycle.facing.every((line) => line.unit === null || line.unit === 'kWh') ? 'kWh' : 'Quantity';
  const heads = (
    <>
      <th scope="col" className="text">
        Line
      </th>
      <th scope="col">{quantityHead}</th>
      <th scope="col">Rate</th>
      <th scope="col">Amount</th>
    </>
  );
  return (
    <table className="ruled facing">
      <thead>
        <tr>
          <td colSpan={4}>
            <h2>{BILLED_TITLE}</h2>
            <p className="hint">{statementWords(cycle)}</p>
          </td>
          <td />
          <td colSpan={4}>
            <h2>{OURS_TITLE}</h2>
            <p className="hint">{oursWords(cycle)}</p>
          </td>
        </tr>
        <tr>
          {heads}
          <td>
            <span className="visually-hidden">Verdict</span>
          </td>
          {heads}
        </tr>
      </thead>
      <tbody>
        {cycle.facing.map((line) => (
          <tr key={line.key} className={rowLook(line)}>
            <th scope="row">{line.billed && <Label line={line} inDue={line.billed.inDue} />}</th>
            <td className={differentQuantity(line) ? 'neg' : undefined}>
              {line.billed && quantityWords(line.billed.quantity, line.unit)}
            </td>
            <td className={differentRate(line) ? 'neg' : undefined}>
              {line.billed && rateWords(line.billed.rate, line.unit)}
            </td>
            <td>{line.billed && <Money cents={line.billed.amountCents} />}</td>
            <td>
              <LineMark line={line} />
            </td>
            <td className="text">{line.ours && <Label line={line} inDue={line.ours.inDue} />}</td>
            <td>{line.ours && quantityWords(line.ours.quantity, line.unit)}</td>
            <td>{line.ours && rateWords(line.ours.rate, line.unit)}</td>
            <td>{line.ours && <OursAmount line={line} />}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** On a phone each line is a block: its name and verdict, then billed and ours under each other. */
function FacingBlocks({ cycle }: { cycle: Cycle }) {
  return (
    <>
      <h2>
        {BILLED_TITLE}, and {OURS_TITLE.toLowerCase()}
      </h2>
      <p className="hint">
        {statementWords(cycle)}. {oursWords(cycle)}.
      </p>
      <ul className="mt-3 border-t-2 border-ink">
        {cycle.facing.map((line) => (
          <li key={line.key} className={BLOCK_LOOKS[partOf(line)]}>
            <p className="flex items-baseline justify-between gap-4">
              <span className="font-semibold">
                <Label line={line} inDue={(line.billed ?? line.ours)?.inDue ?? true} />
              </span>
              <LineMark line={line} />
            </p>
            {line.billed && (
              <p className="flex items-baseline justify-between gap-4">
                <span className="text-soft">billed {sideWords(line.billed, line.unit)}</span>
                <Money cents={line.billed.amountCents} />
              </p>
            )}
            {line.ours && (
              <p className="flex items-baseline justify-between gap-4">
                <span className="text-soft">ours {sideWords(line.ours, line.unit)}</span>
                <OursAmount line={line} />
              </p>
            )}
          </li>
        ))}
      </ul>
    </>
  );
}

/** Electric charges and other services each have a total of their own above `Due`. */
function partOf(line: FacingLine): 'due' | 'subtotal' | 'line' {
  if (line.key === 'due') return 'due';
  return line.key.startsWith('subtotal:') ? 'subtotal' : 'line';
}

const BLOCK_LOOKS = {
  due: 'border-t border-b-4 border-double border-ink py-2 font-bold',
  subtotal: 'border-t border-b-2 border-ink py-2 font-semibold',
  line: 'border-b border-rule py-2',
} as const;

function rowLook(line: FacingLine): string | undefined {
  const part = partOf(line);
  return part === 'due' ? 'total' : part === 'subtotal' ? 'subtotal' : undefined;
}

function Label({ line, inDue }: { line: FacingLine; inDue: boolean }) {
  return (
    <>
      {line.label}
      {!inDue && <span className="text-soft">, not in the amount due</span>}
    </>
  );
}

function LineMark({ line }: { line: FacingLine }) {
  const verdict = lineVerdict(line);
  return <span className={verdict.look}>{verdict.text}</span>;
}

function OursAmount({ line }: { line: FacingLine }) {
  if (!line.ours) return null;
  return (
    <MoneyFigure
      title={`${line.label}, as your meters say`}
      cents={line.ours.amountCents}
      working={line.ours.working}
    />
  );
}

function sideWords(side: { quantity: string | null; rate: string | null }, unit: string | null): string {
  const quantity = quantityWords(side.quantity, unit);
  const rate = rateWords(side.rate, unit);
  const amount = quantity !== '' && unit === 'kWh' ? `${quantity} kWh` : quantity;
  return [amount, rate].filter((part) => part !== '').join(' at ');
}

function differentQuantity(line: FacingLine): boolean {
  return (
    line.verdict === 'differs' &&
    line.billed?.quantity != null &&
    line.ours?.quantity != null &&
    Number(line.billed.quantity) !== Number(line.ours.quantity)
  );
}

function differentRate(line: FacingLine): boolean {
  return (
    line.verdict === 'differs' &&
    line.billed?.rate != null &&
    line.ours?.rate != null &&
    Number(line.billed.rate) !== Number(line.ours.rate)
  );
}

function statementWords(cycle: Cycle): string {
  const { statement } = cycle;
  const of = statement.statementOn ? `Statement of ${dayMonth(statement.statementOn)}` : 'Statement';
  return `${of}, ${placeWords(statement.source)}`;
}

function oursWords(cycle: Cycle): string {
  const plan = cycle.planFrom ? `Rate plan from ${fullDate(cycle.planFrom)}` : 'No rate plan for this cycle';
  const from = new Set([cycle.energy.import?.from, cycle.energy.export?.from]);
  const meters = from.has('intervals') ? 'interval data' : from.has('register') ? 'register reads' : null;
  return meters ? `${plan}, ${meters}` : plan;
}
