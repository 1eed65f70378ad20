import { useQuery } from '@tanstack/react-query';
import { moneyPapersApi } from '#shared/api/money-papers.ts';
import { addressOf } from '#src/lib/api.ts';
import { papersQuery } from './paper-queries.ts';

/** The paper behind a figure, to take away as it came; nothing where there is none. */
export function PaperLink({ householdId, documentId }: { householdId: string; documentId: string | null }) {
  const view = useQuery({ ...papersQuery(householdId), enabled: documentId !== null });
  const paper = view.data?.papers.find(({ id }) => id === documentId);
  if (documentId === null || !paper) return null;
  return (
    <a
      className="link no-print inline-flex min-h-11 min-w-0 items-center [overflow-wrap:anywhere] sm:min-h-6"
      href={addressOf(moneyPapersApi.paper, { householdId, documentId })}
      download={paper.fileName}
    >
      {paper.fileName}
    </a>
  );
}
