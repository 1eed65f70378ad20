import { useRef } from 'react';
import { type CreditView, creditApi } from '#shared/api/credit.ts';
import { addressOf } from '#src/lib/api.ts';
import { fullDate } from '#src/lib/format.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { useAddPaper } from './credit-queries.ts';

/** The papers behind the credit: contract, final invoice, inspection, permission to operate, the forms as filed. */
export function Papers({ view, householdId, canEdit }: { view: CreditView; householdId: string; canEdit: boolean }) {
  const add = useAddPaper(householdId);
  const chooser = useRef<HTMLInputElement>(null);
  return (
    <Sheet title="Papers">
      <ul className="mt-2 border-t-2 border-ink">
        {view.papers.map((paper) => (
          <li
            key={paper.id}
            className="flex flex-wrap items-baseline justify-between gap-x-5 border-b border-rule py-2"
          >
            <a
              className="min-w-0 underline underline-offset-3 [overflow-wrap:anywhere]"
              href={addressOf(creditApi.paper, { householdId, documentId: paper.id })}
              download={paper.fileName}
            >
              {paper.fileName}
            </a>
            <span className="hint whitespace-nowrap">
              {sizeWords(paper.size)}, {fullDate(paper.uploadedOn)}
            </span>
          </li>
        ))}
        {view.papers.length === 0 && <li className="border-b border-rule py-2 text-soft">None yet.</li>}
      </ul>
      <p className="hint mt-2">
        A preparer asks for: the contract and final invoice, proof of payment, the final inspection, permission to
        operate, and each Form 5695 with its worksheet.
      </p>
      {canEdit && (
        <div className="no-print mt-4">
          <input
            ref={chooser}
            type="file"
            className="visually-hidden"
            tabIndex={-1}
            aria-hidden="true"
            onChange={(event) => {
              const file = event.target.files?.[0];
              if (file) add.mutate(file);
              event.target.value = '';
            }}
          />
          <Button look="plain" busy={add.isPending} onClick={() => chooser.current?.click()}>
            {add.isPending ? 'Sending the paper' : 'Add a paper'}
          </Button>
          <p role="status" className={add.isError ? 'neg mt-2' : 'hint mt-2'}>
            {add.isError ? errorWords(add.error) : add.isSuccess ? 'Added.' : ''}
          </p>
        </div>
      )}
    </Sheet>
  );
}

function sizeWords(bytes: number): string {
  if (bytes < 1000) return `${bytes} bytes`;
  return bytes < 1_000_000 ? `${Math.round(bytes / 1000)} kB` : `${(bytes / 1_000_000).toFixed(1)} MB`;
}
