import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { moneyPapersApi, type PapersView } from '#shared/api/money-papers.ts';
import { addressOf } from '#src/lib/api.ts';
import { fullDate } from '#src/lib/format.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { SelectField } from '#src/ui/field.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { PaperChooser } from './paper-chooser.tsx';
import { papersQuery, useLinkPaper, useRemovePaper } from './paper-queries.ts';
import { sizeWords, targetKey, targetWords } from './paper-words.ts';

type Paper = PapersView['papers'][number];

/** Every paper behind the figures of Money and Tax credit: what it proves, who added it and when. */
export function PaperSheet({ householdId, canEdit }: { householdId: string; canEdit: boolean }) {
  const view = useQuery(papersQuery(householdId));
  return (
    <Sheet
      title="Papers"
      hint="Statements, receipts and contracts behind the figures above. A figure taken from one opens to it. Members may read them; a tax preparer sees only those of the tax credit."
    >
      {view.isPending && <div className="bone h-24" aria-busy="true" />}
      {view.isError && (
        <p className="neg" role="alert">
          {errorWords(view.error)}
        </p>
      )}
      {view.isSuccess && (
        <ul className="mt-2 border-t-2 border-ink">
          {view.data.papers.map((paper) => (
            <PaperRow key={paper.id} paper={paper} view={view.data} householdId={householdId} canEdit={canEdit} />
          ))}
          {view.data.papers.length === 0 && <li className="border-b border-rule py-2 text-soft">None yet.</li>}
        </ul>
      )}
      {canEdit && (
        <div className="mt-4">
          <PaperChooser householdId={householdId} label="Add a paper" onAdded={() => {}} />
          <p className="hint">PDF, PNG, JPEG, CSV or text, up to 20 MB. It is kept as it came.</p>
        </div>
      )}
    </Sheet>
  );
}

function PaperRow({
  paper,
  view,
  householdId,
  canEdit,
}: {
  paper: Paper;
  view: PapersView;
  householdId: string;
  canEdit: boolean;
}) {
  const link = useLinkPaper(householdId);
  const remove = useRemovePaper(householdId);
  const error = link.error ?? remove.error;
  return (
    <li className="border-b border-rule py-2">
      <div className="flex flex-wrap items-baseline justify-between gap-x-5">
        <a
          className="link inline-flex min-h-11 min-w-0 items-center [overflow-wrap:anywhere] sm:min-h-6"
          href={addressOf(moneyPapersApi.paper, { householdId, documentId: paper.id })}
          download={paper.fileName}
        >
          {paper.fileName}
        </a>
        <span className="hint">
          {sizeWords(paper.size)}, added by {paper.uploadedBy} on {fullDate(paper.uploadedOn)}
        </span>
      </div>
      <ul>
        {paper.proves.map((target) => (
          <li key={targetKey(target)} className="flex flex-wrap items-baseline justify-between gap-x-5">
            <span>{targetWords(target)}</span>
            {canEdit && (
              <button
                type="button"
                className="link no-print min-h-11 text-[15px] text-soft sm:min-h-9"
                disabled={link.isPending}
                onClick={() => link.mutate({ kind: target.kind, id: target.id, documentId: null })}
              >
                Take off
                <span className="visually-hidden"> {targetWords(target)}</span>
              </button>
            )}
          </li>
        ))}
        {paper.proves.length === 0 && (
          <li className="hint">
            {paper.kind === 'credit' ? 'Among the papers of the tax credit.' : 'Behind no figure yet.'}
          </li>
        )}
      </ul>
      {error && (
        <p className="neg" role="alert">
          {errorWords(error)}
        </p>
      )}
      {canEdit && (
        <div className="no-print flex flex-wrap items-center gap-x-5">
          <LinkPaper
            paper={paper}
            view={view}
            busy={link.isPending}
            onChoose={(kind, id) => link.mutate({ kind, id, documentId: paper.id })}
          />
          {paper.removable && (
            <button
              type="button"
              className="link min-h-11 text-[15px] text-soft sm:min-h-9"
              disabled={remove.isPending}
              onClick={() => remove.mutate(paper.id)}
            >
              Remove this paper
              <span className="visually-hidden"> {paper.fileName}</span>
            </button>
          )}
        </div>
      )}
    </li>
  );
}

/** Chooses what a paper proves, among what has no paper yet. */
function LinkPaper({
  paper,
  view,
  busy,
  onChoose,
}: {
  paper: Paper;
  view: PapersView;
  busy: boolean;
  onChoose: (kind: PapersView['targets'][number]['kind'], id: string) => void;
}) {
  const [open, setOpen] = useState(false);
  const [chosen, setChosen] = useState('');
  const free = view.targets.filter(
    ({ kind, documentId }) =>
      documentId === null && (paper.kind === 'credit' || (kind !== 'creditCost' && kind !== 'creditYear')),
  );
  if (free.length === 0) return null;
  if (!open) {
    return (
      <button type="button" className="link min-h-11 text-[15px] sm:min-h-9" onClick={() => setOpen(true)}>
        Say what it proves
        <span className="visually-hidden">: {paper.fileName}</span>
      </button>
    );
  }
  const target = free.find((one) => targetKey(one) === chosen);
  return (
    <div className="w-full max-w-[460px]">
      <SelectField label="It proves" value={chosen} onChange={(event) => setChosen(event.target.value)}>
        <option value="">choose</option>
        {free.map((one) => (
          <option key={targetKey(one)} value={targetKey(one)}>
            {targetWords(one)}
          </option>
        ))}
      </SelectField>
      <p className="mt-2 mb-3 flex items-center gap-5">
        <Button
          look="plain"
          busy={busy}
          disabled={!target}
          onClick={() => {
            if (!target) return;
            onChoose(target.kind, target.id);
            setOpen(false);
            setChosen('');
          }}
        >
          Set
        </Button>
        <button type="button" className="link min-h-11" onClick={() => setOpen(false)}>
          Leave it
        </button>
      </p>
    </div>
  );
}
