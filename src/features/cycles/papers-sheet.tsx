import { type CycleView, cyclesApi } from '#shared/api/cycles.ts';
import type { Statement } from '#shared/facts/papers.ts';
import { parseDay } from '#shared/units/day.ts';
import { addressOf } from '#src/lib/api.ts';
import { fullDate } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Sheet } from '#src/ui/sheet.tsx';
import { placeWords } from './paper-words.ts';
import { statementChanges } from './statement-changes.ts';

/** The papers a cycle rests on, and how its statement was corrected. */
export function PapersSheet({ view }: { view: CycleView }) {
  const { id } = useHousehold();
  const { statement } = view.cycle;
  return (
    <Sheet title="Papers and corrections">
      <ul className="mt-2 border-t-2 border-ink">
        <li className="flex flex-wrap justify-between gap-x-5 border-b border-rule py-2">
          <span>
            Statement{statement.statementOn && ` of ${fullDate(statement.statementOn)}`}
            {statement.revision > 1 && `, revision ${statement.revision}`}
          </span>
          <span className="hint">{placeWords(statement.source)}</span>
        </li>
        {view.documents.map((document) => (
          <li key={document.id} className="flex flex-wrap justify-between gap-x-5 border-b border-rule py-2">
            <a
              className="link inline-flex min-h-11 min-w-0 items-center break-words sm:min-h-6"
              href={addressOf(cyclesApi.paper, { householdId: id, documentId: document.id })}
              download={document.fileName}
            >
              {document.fileName}
            </a>
            <span className="hint">kept as it came</span>
          </li>
        ))}
      </ul>
      {view.revisions.length > 0 && (
        <details className="mt-4">
          <summary className="link inline-flex min-h-11 cursor-pointer items-center">
            {view.revisions.length === 1 ? 'One earlier revision' : `${view.revisions.length} earlier revisions`}
          </summary>
          <ol>
            {view.revisions.map((revision, index) => (
              <Revision
                key={revision.revision}
                before={revision}
                after={index === 0 ? statement : (view.revisions[index - 1] ?? statement)}
              />
            ))}
          </ol>
        </details>
      )}
    </Sheet>
  );
}

function Revision({ before, after }: { before: Statement; after: Statement }) {
  const changes = statementChanges(before, after);
  return (
    <li className="border-t border-rule py-3">
      <p>
        <b>
          Revision {before.revision} → {after.revision}
        </b>
        , {after.enteredBy}, {stamp(after.enteredAt)}
        {after.reason && <>: “{after.reason}”</>}
      </p>
      {changes.length === 0 ? (
        <p className="hint">No value changed.</p>
      ) : (
        <ul className="hint">
          {changes.map((change) => (
            <li key={change}>{change}</li>
          ))}
        </ul>
      )}
    </li>
  );
}

function stamp(at: string): string {
  const day = parseDay(at.slice(0, 10));
  return day ? fullDate(day) : at;
}
