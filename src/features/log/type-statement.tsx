import { useQuery } from '@tanstack/react-query';
import { useHousehold } from '#src/lib/household.ts';
import { StatementForm } from '#src/ui/statement-form/statement-form.tsx';
import { PageSkeleton } from '#src/ui/states.tsx';
import { lastStatementQuery, statedQuery, useAddStatement } from './log-queries.ts';
import { emptyStatementForm } from './next-statement.ts';

/** A statement typed from paper, laid out from the last one, the rate plan and the meters. */
export function TypeStatement({ onDone, onCancel }: { onDone: () => void; onCancel: () => void }) {
  const { id } = useHousehold();
  const stated = useQuery(statedQuery(id));
  const last = useQuery(lastStatementQuery(id));
  const add = useAddStatement(id);
  if (stated.isPending || last.isPending) return <PageSkeleton />;
  return (
    <StatementForm
      defaults={emptyStatementForm(stated.data ?? null, last.data ?? null)}
      busy={add.isPending}
      refusal={add.error}
      save="Take it in"
      onCancel={onCancel}
      onSave={(statement) => add.mutate(statement, { onSuccess: onDone })}
    />
  );
}
