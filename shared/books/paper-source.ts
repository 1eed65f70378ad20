import type { DocumentFacts } from '../facts/papers.ts';
import type { Source } from '../working.ts';

/** What a book needs to know of a paper to name it. */
export type PaperName = Pick<DocumentFacts, 'id' | 'fileName'>;

/** The paper a typed figure was taken from, or `otherwise` where it names none that is kept. */
export function sourceOfPaper(documentId: string | null, papers: readonly PaperName[], otherwise: Source): Source {
  const paper = documentId === null ? undefined : papers.find(({ id }) => id === documentId);
  if (paper === undefined) return otherwise;
  return { kind: 'document', documentId: paper.id, fileName: paper.fileName, place: 'the whole file' };
}
