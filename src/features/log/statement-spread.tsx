import { useMemo, useState } from 'react';
import type { StatementBody } from '#shared/api/cycles.ts';
import type { DraftStatement, LogDraft, SourceTable } from '#shared/api/log.ts';
import { fullDate } from '#src/lib/format.ts';
import { type ReadValue, readValues } from './read-values.ts';
import { rowsOfStatement } from './source-rows.ts';
import { SourceView } from './source-view.tsx';
import { ValueRow } from './value-row.tsx';

/** Facing pages of the check: the file on the left, what was read on the right. A typed statement has no left page. */
export function StatementSpread({
  drafted,
  file,
  saving,
  fault,
  onChange,
  onEdit,
}: {
  drafted: DraftStatement;
  file: LogDraft['files'][number] | null;
  saving: boolean;
  fault: string | null;
  onChange: (statement: StatementBody) => void;
  onEdit: () => void;
}) {
  const [active, setActive] = useState<number[]>([]);
  const { values, otherChecks } = useMemo(() => readValues(drafted), [drafted]);
  const own = useMemo(() => (file ? rowsOfStatement(file.table, drafted.statement) : []), [file, drafted]);
  const placed = values.map((value) => (file ? { ...value, rows: placesOf(value, file.table, own) } : value));
  const numbers = new Map(placed.filter((value) => value.doubtful).map((value, index) => [value.key, index + 1]));
  const marks = new Map(
    placed
      .flatMap((value) => value.rows.map((row) => [row, numbers.get(value.key)] as const))
      .filter((one): one is [number, number] => one[1] !== undefined),
  );
  return (
    <div
      className={`mt-[26px] grid grid-cols-[minmax(0,1fr)] gap-x-[34px] gap-y-8 ${file ? 'lg:grid-cols-[minmax(0,470px)_minmax(0,1fr)]' : 'max-w-[760px]'}`}
    >
      {file && <SourceView fileName={file.fileName} table={file.table} own={own} marks={marks} active={active} />}
      <section aria-label="What we read" aria-busy={saving}>
        <h2>{file ? 'What we read' : 'What you typed'}</h2>
        <p className="hint mb-2">
          Tab through and change anything; Enter takes it in, Escape puts it back.{' '}
          <button type="button" className="link text-ink" onClick={onEdit}>
            Change lines and quantities
          </button>
        </p>
        {drafted.alreadyPosted && (
          <p className="mark-wait mb-2 whitespace-normal!">Exactly this is posted already; it will be left alone.</p>
        )}
        {drafted.replaces && (
          <p className="mark-wait mb-2 whitespace-normal!">
            This becomes revision {drafted.replaces.revision + 1} of the cycle to {fullDate(drafted.replaces.to)}; the
            earlier one stays readable.
          </p>
        )}
        {fault && (
          <p role="alert" className="field-error mb-2">
            {fault}
          </p>
        )}
        <div className="px-3">
          {placed.map((value) => (
            <ValueRow
              key={value.key}
              value={value}
              mark={numbers.get(value.key) ?? null}
              onFocus={setActive}
              onChange={onChange}
            />
          ))}
        </div>
        {otherChecks.map((check) => (
          <div key={check.key} className="margin-note bad mt-4 mb-0!">
            <b>{check.title}</b>
            <span>{[check.cause, check.advice].filter(Boolean).join(' ')}</span>
          </div>
        ))}
        {drafted.edited && <p className="hint mt-3">Values were changed by hand; what was read stays known.</p>}
      </section>
    </div>
  );
}

const ITEM_ROWS: Record<string, RegExp> = {
  dates: /^statement$/,
  due: /amount.?due/,
  previousBalanceCents: /previous.?balance|balance.?forward/,
  paymentsCents: /^payments?\b/,
  budget: /^(budget|level|average)\b.*(amount|bill|payment)/,
  budgetBalance: /(budget|deferred|levelized).*balance/,
  budgetSettled: /^budget (settle|true|year)/,
};

/** Where a value stands in the file: its own row where known, else the row of its record among the statement's. */
function placesOf(value: ReadValue, table: SourceTable, own: number[]): number[] {
  const pattern = ITEM_ROWS[value.key];
  if (value.rows.length > 0 || !pattern) return value.rows;
  const rows = table.rows.filter((row) => own.includes(row.row));
  const found = rows.find((row) => row.cells.slice(0, 5).some((cell) => pattern.test(cell.trim().toLowerCase())));
  return found ? [found.row] : value.key === 'dates' && rows[0] ? [rows[0].row] : [];
}
