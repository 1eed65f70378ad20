import type { Fault } from '#shared/problem.ts';
import { useHousehold } from '#src/lib/household.ts';
import { Button } from '#src/ui/button.tsx';
import { countOf } from './counts.ts';
import { FaultList } from './faults.tsx';
import { useKeepGoodRows } from './log-queries.ts';

/** Rows of a file that cannot be read: why, and whether to wait for a better file or go on with the others. */
export function UnreadRows({
  file,
  faults,
  bad,
  good,
  advice,
}: {
  file: { documentId: string; fileName: string; keepGoodRows: boolean };
  faults: Fault[];
  /** How many rows cannot be read, and how many can. */
  bad: number;
  good: number;
  /** What can be done before going on. */
  advice: string;
}) {
  const { id } = useHousehold();
  const keep = useKeepGoodRows(id);
  const say = (kept: boolean) => keep.mutate({ documentId: file.documentId, keep: kept });
  return (
    <div className={`margin-note mt-3 ${file.keepGoodRows ? '' : 'bad'}`} role="status">
      <b>
        {file.keepGoodRows
          ? `${countOf(bad, 'row')} left out, as you said`
          : `${countOf(bad, 'row')} of ${file.fileName} cannot be read`}
      </b>
      <span>{file.keepGoodRows ? 'They are kept with their reasons and count for nothing.' : advice}</span>
      {faults.length > 0 && <FaultList faults={faults} />}
      <p className="mt-3">
        {file.keepGoodRows ? (
          <Button look="plain" busy={keep.isPending} onClick={() => say(false)}>
            Wait for a corrected file
          </Button>
        ) : (
          good > 0 && (
            <Button look="plain" busy={keep.isPending} onClick={() => say(true)}>
              Keep the {countOf(good, 'good row')}
            </Button>
          )
        )}
      </p>
    </div>
  );
}
