import * as z from 'zod/mini';
import { bookId } from '../books/book.ts';
import { acceptedDifference, budgetNeedsLines, statementSchema } from '../facts/papers.ts';
import { cycleSchema, cycleState } from '../ledger/cycle.ts';
import { owedList } from '../ledger/owed-list.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';
import { endpoint, HOUSEHOLD, OWNER } from './endpoint.ts';

/** A row of the cycles table. Energies are null where missing. */
export const cycleRow = z.object({
  from: daySchema,
  to: daySchema,
  days: z.int(),
  productionWh: z.nullable(whSchema),
  selfUseWh: z.nullable(whSchema),
  exportWh: z.nullable(whSchema),
  importWh: z.nullable(whSchema),
  billedCents: centsSchema,
  oursCents: z.nullable(centsSchema),
  /** Closing balances as the statement prints them, else as computed: "$31.77" in USD cents or kWh. */
  bankCents: z.nullable(centsSchema),
  bankWh: z.nullable(whSchema),
  incentiveCents: centsSchema,
  loanCents: centsSchema,
  avoidedCents: centsSchema,
  addedCents: centsSchema,
  state: cycleState,
  provisional: z.boolean(),
  estimated: z.boolean(),
  /** The first differing check's short verdict, for the table; null when none. */
  differs: z.nullable(z.string()),
});
export type CycleRow = z.infer<typeof cycleRow>;

export const cycleView = z.object({
  cycle: cycleSchema,
  previousTo: z.nullable(daySchema),
  nextTo: z.nullable(daySchema),
  previousLabel: z.nullable(z.object({ from: daySchema, to: daySchema })),
  nextLabel: z.nullable(z.object({ from: daySchema, to: daySchema })),
  /** Earlier revisions of this cycle's statement, newest first. */
  revisions: z.array(statementSchema),
  accepted: z.array(acceptedDifference),
  documents: z.array(z.object({ id: z.string(), fileName: z.string() })),
});
export type CycleView = z.infer<typeof cycleView>;

/** What a person can state of a statement: everything but identity, revision, source and authorship. */
export const statementBody = z
  .strictObject({
    from: daySchema,
    to: daySchema,
    printedDays: statementSchema.shape.printedDays,
    statementOn: statementSchema.shape.statementOn,
    dueOn: statementSchema.shape.dueOn,
    reads: statementSchema.shape.reads,
    importWh: statementSchema.shape.importWh,
    exportWh: statementSchema.shape.exportWh,
    productionWh: statementSchema.shape.productionWh,
    lines: statementSchema.shape.lines,
    banks: statementSchema.shape.banks,
    previousBalanceCents: statementSchema.shape.previousBalanceCents,
    paymentsCents: statementSchema.shape.paymentsCents,
    amountDueCents: statementSchema.shape.amountDueCents,
    budget: statementSchema.shape.budget,
  })
  .check(budgetNeedsLines);
export type StatementBody = z.infer<typeof statementBody>;

const at = '/api/households/:householdId/cycles';
export const cyclesApi = {
  list: endpoint({
    method: 'GET',
    path: at,
    access: HOUSEHOLD,
    /** `owed`: what the utility owes or is owed, with its causes. */
    response: z.object({ rows: z.array(cycleRow), books: z.array(bookId), owed: owedList }),
  }),
  one: endpoint({ method: 'GET', path: `${at}/:to`, access: HOUSEHOLD, response: cycleView }),
  /** A paper a cycle rests on, as it came. */
  paper: endpoint({
    method: 'GET',
    path: '/api/households/:householdId/documents/:documentId',
    access: HOUSEHOLD,
    kind: 'download',
  }),
  /** Lets a differing check stand, with a note. `check` is the check's key. */
  accept: endpoint({
    method: 'POST',
    path: `${at}/:to/accept`,
    access: OWNER,
    body: z.strictObject({ check: z.string(), note: acceptedDifference.shape.note }),
    response: cycleView,
  }),
  withdrawAccept: endpoint({
    method: 'POST',
    path: `${at}/:to/withdraw-accept`,
    access: OWNER,
    body: z.strictObject({ check: z.string() }),
    response: cycleView,
  }),
  /** Corrects a statement: a new revision with a reason. Changing its dates onto another cycle answers `cycle-overlaps`. */
  correct: endpoint({
    method: 'POST',
    path: `${at}/:to/correct`,
    access: OWNER,
    body: z.strictObject({
      statement: statementBody,
      reason: z.string().check(z.minLength(1, { error: 'Say why, in a few words.' }), z.maxLength(500)),
    }),
    response: z.object({ to: daySchema }),
  }),
};
