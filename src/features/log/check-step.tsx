import { useState } from 'react';
import type { DraftStatement, LogDraft, PostedView } from '#shared/api/log.ts';
import { cycleRange, kwh, monthName } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { StatementForm } from '#src/ui/statement-form/statement-form.tsx';
import { formOfStatement } from '#src/ui/statement-form/statement-of-form.ts';
import { countOf, numberWord } from './counts.ts';
import { useChangeStatement, useDiscard, usePost } from './log-queries.ts';
import { countValues, readValues } from './read-values.ts';
import { CHANNEL_NAMES } from './readings-sheet.tsx';
import { StatementSpread } from './statement-spread.tsx';

export function CheckStep({
  draft,
  onPosted,
  onPapers,
}: {
  draft: LogDraft;
  onPosted: (posted: PostedView) => void;
  onPapers: () => void;
}) {
  const { id } = useHousehold();
  const change = useChangeStatement(id);
  const [chosen, setChosen] = useState<string | null>(null);
  const [editing, setEditing] = useState(false);
  const shown = draft.statements.find((one) => one.key === chosen) ?? draft.statements[0] ?? null;
  if (shown && editing) {
    return (
      <>
        <Sentence title="Change the statement" lede="As printed. What was read stays known beside it.">
          <b>{cycleRange(shown.statement.from, shown.statement.to)}</b>, line by line.
        </Sentence>
        <StatementForm
          defaults={formOfStatement(shown.statement)}
          busy={change.isPending}
          refusal={change.error}
          save="Take the changes in"
          onCancel={() => setEditing(false)}
          onSave={(statement) => change.mutate({ key: shown.key, statement }, { onSuccess: () => setEditing(false) })}
        />
      </>
    );
  }
  return (
    <>
      <CheckSentence draft={draft} />
      {draft.statements.length > 1 && <Picker statements={draft.statements} shown={shown} onChoose={setChosen} />}
      {shown && (
        <StatementSpread
          key={shown.key}
          drafted={shown}
          file={draft.files.find((file) => file.documentId === shown.documentId) ?? null}
          saving={change.isPending}
          fault={change.isError ? errorWords(change.error) : null}
          onChange={(statement) => change.mutate({ key: shown.key, statement })}
          onEdit={() => {
            change.reset();
            setEditing(true);
          }}
        />
      )}
      {draft.readings.length > 0 && (
        <section className="mt-8 border-t-2 border-ink pt-4">
          <h2>Readings</h2>
          <ul>
            {draft.readings.map((one) => (
              <li key={one.key} className="border-b border-rule py-2.5">
                <b>{kwh(one.totalWh)} kWh</b> {CHANNEL_NAMES[one.mapping.channel].toLowerCase()}
                {one.firstDay && one.lastDay && <>, {cycleRange(one.firstDay, one.lastDay)}</>}
                <span className="hint ml-3">{one.fileName}</span>
              </li>
            ))}
          </ul>
        </section>
      )}
      <PostBar draft={draft} onPosted={onPosted} onPapers={onPapers} />
    </>
  );
}

function CheckSentence({ draft }: { draft: LogDraft }) {
  const counts = draft.statements.map((one) => countValues(readValues(one).values));
  const read = counts.reduce((sum, one) => sum + one.read, 0);
  const doubtful = counts.reduce((sum, one) => sum + one.doubtful, 0);
  if (draft.statements.length === 0) {
    const days = draft.readings.reduce((sum, one) => sum + one.acceptedRows, 0);
    return (
      <Sentence
        title="Check"
        lede="No statement is in this log. Readings alone can be posted; they wait for their statements."
      >
        <b>{countOf(days, 'reading')} read</b>.
      </Sentence>
    );
  }
  const eye =
    doubtful === 0
      ? 'none needs your eye'
      : doubtful === 1
        ? 'one needs your eye'
        : `${numberWord(doubtful)} need your eye`;
  const lede =
    doubtful === 0
      ? 'Every value agrees with what it could be held against.'
      : 'Everything else agrees with what it could be held against. If the page really prints it so, post it as printed.';
  return (
    <Sentence title="Check" lede={lede}>
      <b>
        {countOf(read, 'value')} {draft.files.length === 0 ? 'typed' : 'read'}
      </b>
      , {eye}.
    </Sentence>
  );
}

function Picker({
  statements,
  shown,
  onChoose,
}: {
  statements: DraftStatement[];
  shown: DraftStatement | null;
  onChoose: (key: string) => void;
}) {
  return (
    <nav aria-label="Cycles in this log" className="mt-6 flex flex-wrap gap-x-6 border-b border-rule">
      {statements.map((one) => {
        const { doubtful } = countValues(readValues(one).values);
        const here = one.key === shown?.key;
        return (
          <button
            key={one.key}
            type="button"
            aria-current={here ? 'true' : undefined}
            className={`min-h-11 border-b-[3px] ${here ? 'border-accent font-semibold' : 'border-transparent text-soft'}`}
            onClick={() => onChoose(one.key)}
          >
            {cycleRange(one.statement.from, one.statement.to)}
            {doubtful > 0 && (
              <span className="mark-no ml-2">
                {doubtful}
                <span className="visually-hidden"> to look at</span>
              </span>
            )}
          </button>
        );
      })}
    </nav>
  );
}

function PostBar({
  draft,
  onPosted,
  onPapers,
}: {
  draft: LogDraft;
  onPosted: (posted: PostedView) => void;
  onPapers: () => void;
}) {
  const { id } = useHousehold();
  const post = usePost(id);
  const discard = useDiscard(id);
  const [replace, setReplace] = useState(false);
  const [asking, setAsking] = useState(false);
  const differing = draft.readings.reduce((sum, one) => sum + one.overlap.differentDays.length, 0);
  return (
    <section className="mt-7" aria-label="Post or discard">
      {draft.blockers.map((blocker) => (
        <div key={blocker} className="margin-note bad">
          <b>This stands in the way</b>
          <span>{blocker}</span>
        </div>
      ))}
      {draft.hints.map((hint) => (
        <div key={hint} className="margin-note">
          <span>{hint}</span>
        </div>
      ))}
      {differing > 0 && (
        <label className="mb-5 flex min-h-11 items-start gap-3">
          <input
            type="checkbox"
            className="mt-1 size-5 accent-accent"
            checked={replace}
            onChange={(event) => setReplace(event.target.checked)}
          />
          <span>
            Put the file’s values in place of those here, for {countOf(differing, 'day')} where they differ.
            <span className="hint block">Without this nothing is posted; the file can be taken out instead.</span>
          </span>
        </label>
      )}
      {post.isError && (
        <p role="alert" className="field-error mb-3">
          {errorWords(post.error)}
        </p>
      )}
      <div className="flex flex-wrap items-center gap-5">
        <Button
          busy={post.isPending}
          disabled={!draft.ready || (differing > 0 && !replace)}
          onClick={() => post.mutate(replace, { onSuccess: onPosted })}
        >
          {post.isPending ? 'Posting' : postWords(draft)}
        </Button>
        {asking ? (
          <span className="flex flex-wrap items-center gap-4">
            Take everything out of this log? What is posted stays.
            <Button
              look="plain"
              busy={discard.isPending}
              onClick={() => discard.mutate(undefined, { onSuccess: onPapers })}
            >
              Yes, discard
            </Button>
            <button type="button" className="link min-h-11" onClick={() => setAsking(false)}>
              No
            </button>
          </span>
        ) : (
          <button type="button" className="link min-h-11" onClick={() => setAsking(true)}>
            Discard
          </button>
        )}
      </div>
    </section>
  );
}

function postWords(draft: LogDraft): string {
  const fresh = draft.statements.filter((one) => !one.alreadyPosted);
  const [only] = fresh;
  if (fresh.length > 1) return `Post ${fresh.length} cycles`;
  return only ? `Post ${monthName(only.statement.to)}` : 'Post the readings';
}
