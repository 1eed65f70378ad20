import type { DraftStatement, LogDraft } from '#shared/api/log.ts';
import { cycleRange, fullDate, money } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { countOf } from './counts.ts';
import { useRemoveFile, useRemoveStatement } from './log-queries.ts';
import { UnreadRows } from './unread-rows.tsx';

type DraftFile = LogDraft['files'][number];

export function StatementFileSheet({ file, statements }: { file: DraftFile; statements: DraftStatement[] }) {
  const { id } = useHousehold();
  const remove = useRemoveFile(id);
  return (
    <Sheet
      title={file.fileName}
      hint={`${countOf(file.table.rows.length + file.table.more, 'row')} read`}
      actions={
        <Button look="link" busy={remove.isPending} onClick={() => remove.mutate(file.documentId)}>
          Take the file out
        </Button>
      }
    >
      {file.faults.length > 0 && <FileFaults file={file} />}
      {statements.length > 0 && (
        <ul>
          {statements.map((drafted) => (
            <StatementRow key={drafted.key} drafted={drafted} />
          ))}
        </ul>
      )}
    </Sheet>
  );
}

export function TypedStatementSheet({ drafted }: { drafted: DraftStatement }) {
  return (
    <Sheet title="Typed statement">
      <ul>
        <StatementRow drafted={drafted} />
      </ul>
    </Sheet>
  );
}

function StatementRow({ drafted }: { drafted: DraftStatement }) {
  const { id } = useHousehold();
  const remove = useRemoveStatement(id);
  const { statement } = drafted;
  return (
    <li className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1 border-t border-rule py-2.5">
      <span>
        <b>{cycleRange(statement.from, statement.to)}</b>
        <span className="hint ml-3">{countOf(statement.lines.length, 'line')}</span>
        {drafted.alreadyPosted && <span className="mark-wait ml-3">posted already, left alone</span>}
        {drafted.replaces && (
          <span className="mark-wait ml-3">
            becomes revision {drafted.replaces.revision + 1} of the cycle to {fullDate(drafted.replaces.to)}
          </span>
        )}
      </span>
      <span className="flex items-baseline gap-5">
        {money(statement.amountDueCents)}
        <button
          type="button"
          className="link hint min-h-11"
          disabled={remove.isPending}
          onClick={() => remove.mutate(drafted.key)}
        >
          Take out
          <span className="visually-hidden"> {cycleRange(statement.from, statement.to)}</span>
        </button>
      </span>
    </li>
  );
}

function FileFaults({ file }: { file: DraftFile }) {
  const bad = new Set(file.faults.map((fault) => fault.row)).size;
  return (
    <UnreadRows
      file={file}
      faults={file.faults}
      bad={bad}
      good={file.table.rows.length + file.table.more - bad}
      advice="Correct the file and choose it again, or go on with the rows that can be read."
    />
  );
}
