import type { Statement } from '#shared/facts/papers.ts';
import { StatementForm } from '#src/ui/statement-form/statement-form.tsx';
import { formOfStatement } from '#src/ui/statement-form/statement-of-form.ts';
import { useCorrect } from './cycles-queries.ts';

/** Corrects a posted statement: the values as they stand, to be changed, and a reason. The old revision stays readable. */
export default function CorrectStatement({
  statement,
  householdId,
  cycleTo,
  onCancel,
  onDone,
}: {
  statement: Statement;
  householdId: string;
  cycleTo: string;
  onCancel: () => void;
  onDone: (to: string) => void;
}) {
  const correct = useCorrect(householdId, cycleTo);
  return (
    <StatementForm
      defaults={formOfStatement(statement)}
      correction
      head={
        <div className="mt-8">
          <h2>Correct the statement</h2>
          <p className="hint">
            Write what the paper says, even where it is wrong. The statement as it stands is kept as revision{' '}
            {statement.revision}.
          </p>
        </div>
      }
      busy={correct.isPending}
      refusal={correct.error}
      save={`Save as revision ${statement.revision + 1}`}
      onCancel={onCancel}
      onSave={(body, reason) => correct.mutate({ statement: body, reason }, { onSuccess: (done) => onDone(done.to) })}
    />
  );
}
