import { useState } from 'react';
import type { LogDraft } from '#shared/api/log.ts';
import { logApi } from '#shared/api/log.ts';
import type { IntervalChannel } from '#shared/facts/papers.ts';
import type { Fault } from '#shared/problem.ts';
import { ApiError, addressOf } from '#src/lib/api.ts';
import { useHousehold } from '#src/lib/household.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { SelectField } from '#src/ui/field.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { numberWord } from './counts.ts';
import { DropZone } from './drop-zone.tsx';
import { FaultList } from './faults.tsx';
import { useUpload } from './log-queries.ts';
import { ReadingsSheet } from './readings-sheet.tsx';
import { StatementFileSheet, TypedStatementSheet } from './statement-file-sheet.tsx';
import { TypeStatement } from './type-statement.tsx';

type Refused = { fileName: string; text: string; faults: Fault[] };

const CHANNELS: { value: IntervalChannel; label: string }[] = [
  { value: 'production', label: 'The production meter' },
  { value: 'monitor', label: 'The inverter’s monitoring' },
  { value: 'import', label: 'Bought, by the utility’s meter' },
  { value: 'export', label: 'Sent out, by the utility’s meter' },
];

export function PapersStep({ draft, onCheck }: { draft: LogDraft; onCheck: () => void }) {
  const { id } = useHousehold();
  const upload = useUpload(id);
  const [channel, setChannel] = useState<IntervalChannel>('production');
  const [refused, setRefused] = useState<Refused[]>([]);
  const [typing, setTyping] = useState(false);
  const count = draft.statements.length + draft.readings.length;
  const send = async (kind: 'statement' | 'readings', files: File[]) => {
    setRefused([]);
    for (const file of files) {
      try {
        await upload.mutateAsync(kind === 'statement' ? { kind, file } : { kind, file, channel });
      } catch (error) {
        const faults = error instanceof ApiError ? error.problem.faults : [];
        setRefused((before) => [...before, { fileName: file.name, text: errorWords(error), faults }]);
      }
    }
  };
  const typed = draft.statements.filter((statement) => statement.documentId === null);
  if (typing) {
    return (
      <>
        <Sentence
          title="Type the statement"
          lede="As printed, line by line. Nothing is posted before you have checked it."
        >
          <b>Type the statement</b> from paper.
        </Sentence>
        <TypeStatement
          onCancel={() => setTyping(false)}
          onDone={() => {
            setTyping(false);
            onCheck();
          }}
        />
      </>
    );
  }
  return (
    <>
      <Sentence
        title="Log this month"
        lede="The statement says what was billed; the production file says what the roof made. One is enough to begin. Nothing is posted before you have checked it."
      >
        {count === 0 ? (
          <>
            <b>Which papers</b> came this month?
          </>
        ) : (
          <>
            <b>{papersRead(draft)}</b> read.
          </>
        )}
      </Sentence>
      {refused.map((one) => (
        <div key={one.fileName} role="alert" className="margin-note bad mt-6 mb-0!">
          <b>{one.fileName} was not taken in</b>
          <span>{one.text}</span>
          {one.faults.length > 0 && <FaultList faults={one.faults} />}
        </div>
      ))}
      <div className="grid gap-x-[26px] md:grid-cols-2">
        <DropZone
          title="Statement"
          hint={
            <>
              A CSV in the book’s own layout; several cycles may stand in one file.{' '}
              <a className="link" href={addressOf(logApi.template)} download>
                Download the template
              </a>
            </>
          }
          action="Choose a statement file"
          busy={upload.isPending}
          onFiles={(files) => void send('statement', files)}
        >
          <p className="mt-3">
            <button type="button" className="link min-h-11" onClick={() => setTyping(true)}>
              Type the statement instead
            </button>
          </p>
        </DropZone>
        <DropZone
          title="Production"
          hint="A CSV from the meter or the inverter, with a time and an energy column."
          action="Choose a production file"
          busy={upload.isPending}
          onFiles={(files) => void send('readings', files)}
        >
          <SelectField
            label="What the file measures"
            value={channel}
            onChange={(event) =>
              setChannel(CHANNELS.find((one) => one.value === event.target.value)?.value ?? 'production')
            }
          >
            {CHANNELS.map((one) => (
              <option key={one.value} value={one.value}>
                {one.label}
              </option>
            ))}
          </SelectField>
        </DropZone>
      </div>
      {draft.files.map((file) => (
        <StatementFileSheet
          key={file.documentId}
          file={file}
          statements={draft.statements.filter((statement) => statement.documentId === file.documentId)}
        />
      ))}
      {typed.map((statement) => (
        <TypedStatementSheet key={statement.key} drafted={statement} />
      ))}
      {draft.readings.map((readings) => (
        <ReadingsSheet key={readings.key} readings={readings} />
      ))}
      {count > 0 && (
        <div className="mt-7">
          <Button onClick={onCheck}>Check what was read</Button>
          {draft.hints.length > 0 && (
            <ul className="hint mt-4">
              {draft.hints.map((hint) => (
                <li key={hint}>{hint}</li>
              ))}
            </ul>
          )}
        </div>
      )}
    </>
  );
}

function papersRead(draft: LogDraft): string {
  const cycles = draft.statements.length;
  const files = draft.readings.length;
  const parts = [
    cycles > 0 ? `${numberWord(cycles)} statement${cycles === 1 ? '' : 's'}` : null,
    files > 0 ? `${numberWord(files)} file${files === 1 ? '' : 's'} of readings` : null,
  ].filter((part) => part !== null);
  const text = parts.join(' and ');
  return text.charAt(0).toUpperCase() + text.slice(1);
}
