import { useQuery } from '@tanstack/react-query';
import { useRef } from 'react';
import { CREDIT_PAPER_KINDS, type CreditPaperKind } from '#shared/books/credit-paper.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { SelectField } from '#src/ui/field.tsx';
import { creditQuery, useAddPaper } from './credit-queries.ts';

/** Which of the credit's papers a figure was taken from, or a file added right there. The form around it keeps what was typed. */
export function CreditPaperField({
  householdId,
  kind,
  value,
  error,
  onChange,
}: {
  householdId: string;
  /** What a file added here is. */
  kind: CreditPaperKind | null;
  value: string;
  error?: string | undefined;
  onChange: (documentId: string) => void;
}) {
  const view = useQuery(creditQuery(householdId));
  const papers = view.data?.papers ?? [];
  const isListed = value === '' || papers.some(({ id }) => id === value);
  const wordsOf = (of: CreditPaperKind) => CREDIT_PAPER_KINDS.find((one) => one.kind === of)?.words ?? '';
  return (
    <>
      <SelectField
        label="Paper"
        hint="It stands behind the figure, and the preparer can open it."
        error={error}
        value={value}
        onChange={(event) => onChange(event.target.value)}
      >
        <option value="">none</option>
        {!isListed && <option value={value}>the paper chosen before</option>}
        {papers.map((paper) => (
          <option key={paper.id} value={paper.id}>
            {wordsOf(paper.paperKind)}: {paper.fileName}
          </option>
        ))}
      </SelectField>
      <div className="mt-2">
        <AddPaper householdId={householdId} kind={kind} label="Add a file" onAdded={onChange} />
      </div>
    </>
  );
}

/** Sends a file and hands its id on; what happened is said under the button. */
export function AddPaper({
  householdId,
  kind,
  label,
  onAdded,
}: {
  householdId: string;
  kind: CreditPaperKind | null;
  label: string;
  onAdded?: (documentId: string) => void;
}) {
  const add = useAddPaper(householdId);
  const chooser = useRef<HTMLInputElement>(null);
  return (
    <div className="no-print">
      <input
        ref={chooser}
        type="file"
        className="visually-hidden"
        tabIndex={-1}
        aria-hidden="true"
        accept=".pdf,.png,.jpg,.jpeg,.csv,.txt"
        onChange={(event) => {
          const file = event.target.files?.[0];
          // The newest paper stands last.
          if (file) add.mutate({ file, kind }, { onSuccess: ({ papers }) => onAdded?.(papers.at(-1)?.id ?? '') });
          event.target.value = '';
        }}
      />
      <Button look="plain" busy={add.isPending} onClick={() => chooser.current?.click()}>
        {add.isPending ? 'Sending the paper' : label}
      </Button>
      <p role="status" className={add.isError ? 'neg mt-2' : 'hint mt-2'}>
        {add.isError ? errorWords(add.error) : add.isSuccess ? 'Added.' : ''}
      </p>
    </div>
  );
}
