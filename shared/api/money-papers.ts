import * as z from 'zod/mini';
import { paperLinkKind } from '../facts/paper-links.ts';
import { documentSchema } from '../facts/papers.ts';
import { daySchema } from '../units/day.ts';
import { endpoint, HOUSEHOLD, OWNER } from './endpoint.ts';

/** A fact that can name a paper. `id` is empty where there is only one of its kind. */
export const paperTarget = z.object({
  kind: paperLinkKind,
  id: z.string(),
  label: z.string(),
  on: z.nullable(daySchema),
  documentId: z.nullable(z.string()),
});
export type PaperTarget = z.infer<typeof paperTarget>;

export const papersView = z.object({
  /** The papers of money and of the tax credit, and any other file a figure of Money was taken from; newest last. */
  papers: z.array(
    z.object({
      ...documentSchema.shape,
      /** The facts that name it. */
      proves: z.array(paperTarget),
      /** Added here and named by nothing. */
      removable: z.boolean(),
    }),
  ),
  /** Everything that can name a paper. */
  targets: z.array(paperTarget),
});
export type PapersView = z.infer<typeof papersView>;

/** What an upload answers: the paper, and whether its bytes were here already (then nothing was changed). */
export const addedPaper = z.object({ documentId: z.string(), alreadyHere: z.boolean(), view: papersView });
export type AddedPaper = z.infer<typeof addedPaper>;

export const paperLinkBody = z.strictObject({
  kind: paperLinkKind,
  id: z.string().check(z.maxLength(120)),
  /** Null takes the paper off. */
  documentId: z.nullable(z.string().check(z.maxLength(120))),
});

const at = '/api/households/:householdId/money/papers';
export const moneyPapersApi = {
  list: endpoint({ method: 'GET', path: at, access: HOUSEHOLD, response: papersView }),
  add: endpoint({ method: 'POST', path: at, access: OWNER, kind: 'upload', response: addedPaper }),
  link: endpoint({ method: 'PUT', path: `${at}/link`, access: OWNER, body: paperLinkBody, response: papersView }),
  paper: endpoint({ method: 'GET', path: `${at}/:documentId`, access: HOUSEHOLD, kind: 'download' }),
  remove: endpoint({ method: 'DELETE', path: `${at}/:documentId`, access: OWNER, response: papersView }),
};
