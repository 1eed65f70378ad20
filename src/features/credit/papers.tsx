import { useState } from 'react';
import { type CreditView, creditApi } from '#shared/api/credit.ts';
import { CREDIT_PAPER_KINDS, type CreditPaperKind } from '#shared/books/credit-paper.ts';
import { addressOf } from '#src/lib/api.ts';
import { fullDate } from '#src/lib/format.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Sheet } from '#src/ui/sheet.tsx';
import { usePutPaperKind } from './credit-queries.ts';
import { AddPaper } from './paper-field.tsx';

/** Asked for by whoever prepares the return; a rebate letter and other papers only where there are some. */
const EXPECTED: readonly CreditPaperKind[] = ['contract', 'invoice', 'payment', 'inspection', 'permission', 'return'];

/** The papers behind the credit by what they are, and which of those a preparer asks for are missing. */
export function Papers({ view, householdId, canEdit }: { view: CreditView; householdId: string; canEdit: boolean }) {
  const [kind, setKind] = useState<CreditPaperKind>('contract');
  const kinds = CREDIT_PAPER_KINDS.map((one) => ({
    ...one,
    papers: view.papers.filter(({ paperKind }) => paperKind === one.kind),
  })).filter((one) => one.papers.length > 0 || EXPECTED.includes(one.kind));
  return (
    <Sheet title="Papers">
      <ul className="mt-2 border-t-2 border-ink">
        {kinds.map((one) => (
          <li key={one.kind} className="border-b border-rule py-2">
            <div className="flex items-baseline justify-between gap-x-5">
              <span>{one.words}</span>
              {one.papers.length === 0 ? (
                <span className="mark-no">missing</span>
              ) : (
                <span className="mark-ok">{one.papers.length === 1 ? '1 file' : `${one.papers.length} files`}</span>
              )}
            </div>
            {one.papers.map((paper) => (
              <Paper key={paper.id} paper={paper} householdId={householdId} canEdit={canEdit} />
            ))}
          </li>
        ))}
      </ul>
      {canEdit && (
        <div className="no-print mt-4 flex flex-wrap items-start gap-x-4 gap-y-2">
          <KindSelect label="What the next paper is" value={kind} onChange={setKind} />
          <AddPaper householdId={householdId} kind={kind} label="Add a paper" />
        </div>
      )}
    </Sheet>
  );
}

function Paper({
  paper,
  householdId,
  canEdit,
}: {
  paper: CreditView['papers'][number];
  householdId: string;
  canEdit: boolean;
}) {
  const put = usePutPaperKind(householdId);
  const [asking, setAsking] = useState(false);
  return (
    <div className="flex flex-wrap items-baseline justify-between gap-x-5 text-[15px]">
      <a
        className="inline-flex min-h-11 min-w-0 items-center underline underline-offset-3 [overflow-wrap:anywhere] sm:min-h-7"
        href={addressOf(creditApi.paper, { householdId, documentId: paper.id })}
        download={paper.fileName}
      >
        {paper.fileName}
      </a>
      <span className="ml-auto flex flex-wrap items-baseline gap-x-4 text-soft">
        {canEdit && !asking && (
          <button type="button" className="link no-print min-h-11 sm:min-h-7" onClick={() => setAsking(true)}>
            Say what it is
            <span className="visually-hidden">: {paper.fileName}</span>
          </button>
        )}
        {asking && (
          <KindSelect
            label={`What ${paper.fileName} is`}
            value={paper.paperKind}
            onChange={(kind) => put.mutate({ documentId: paper.id, kind }, { onSuccess: () => setAsking(false) })}
          />
        )}
        {put.isError && <span className="neg">{errorWords(put.error)}</span>}
        <span className="whitespace-nowrap">
          {sizeWords(paper.size)}, {fullDate(paper.uploadedOn)}
        </span>
      </span>
    </div>
  );
}

function KindSelect({
  label,
  value,
  onChange,
}: {
  label: string;
  value: CreditPaperKind;
  onChange: (kind: CreditPaperKind) => void;
}) {
  return (
    <select
      aria-label={label}
      className="input w-auto!"
      value={value}
      onChange={(event) => {
        const found = CREDIT_PAPER_KINDS.find(({ kind }) => kind === event.target.value);
        if (found) onChange(found.kind);
      }}
    >
      {CREDIT_PAPER_KINDS.map((one) => (
        <option key={one.kind} value={one.kind}>
          {one.words}
        </option>
      ))}
    </select>
  );
}

function sizeWords(bytes: number): string {
  if (bytes < 1000) return `${bytes} bytes`;
  return bytes < 1_000_000 ? `${Math.round(bytes / 1000)} kB` : `${(bytes / 1_000_000).toFixed(1)} MB`;
}
