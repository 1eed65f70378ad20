import { useRef } from 'react';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { useAddPaper } from './paper-queries.ts';

/** Sends a file and hands its id on; what happened is said beside the button. */
export function PaperChooser({
  householdId,
  label,
  onAdded,
}: {
  householdId: string;
  label: string;
  onAdded: (documentId: string) => void;
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
          if (file) add.mutate(file, { onSuccess: ({ documentId }) => onAdded(documentId) });
          event.target.value = '';
        }}
      />
      <Button look="plain" busy={add.isPending} onClick={() => chooser.current?.click()}>
        {add.isPending ? 'Sending the file' : label}
      </Button>
      <p role="status" className={add.isError ? 'neg mt-2' : 'hint mt-2'}>
        {add.isError && errorWords(add.error)}
        {add.isSuccess && (add.data.alreadyHere ? 'This file was here already; nothing was changed.' : 'Added.')}
      </p>
    </div>
  );
}
