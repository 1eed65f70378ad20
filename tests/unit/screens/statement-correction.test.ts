import { describe, expect, it } from 'vitest';
import { statementBody } from '#shared/api/cycles.ts';
import { type Statement, statementSchema } from '#shared/facts/papers.ts';
import { statementChanges } from '#src/features/cycles/statement-changes.ts';
import { formOfStatement, statementOfForm } from '#src/ui/statement-form/statement-of-form.ts';
import { correctionForm } from '#src/ui/statement-form/statement-values.ts';

function statement(): Statement {
  return statementSchema.parse({
    id: 's1',
    revision: 1,
    from: '2026-08-14',
    to: '2026-09-14',
    printedDays: 31,
    statementOn: '2026-09-17',
    dueOn: null,
    reads: [
      {
        meter: '40718',
        channel: 'export',
        from: '2026-08-14',
        to: '2026-09-14',
        previous: '5127',
        current: '5339',
        dials: 5,
        multiplier: '1',
        type: 'actual',
        row: 4,
      },
    ],
    importWh: 498_500,
    exportWh: 212_000,
    productionWh: null,
    lines: [
      {
        component: 'export',
        kind: 'credit',
        label: 'Excess credit',
        quantity: '212',
        unit: 'kWh',
        rate: '0.0950',
        amountCents: -2014,
        inDue: true,
        row: 5,
      },
    ],
    banks: [{ bank: 'credit', unit: 'USD', open: '31.77', close: null, row: null }],
    previousBalanceCents: null,
    paymentsCents: -4200,
    amountDueCents: 5201,
    source: { kind: 'typed', by: 'Priya', on: '2026-09-18' },
    reason: null,
    enteredBy: 'Priya',
    enteredAt: '2026-09-18T10:00:00Z',
  });
}

describe('correcting a statement', () => {
  it('gives back exactly the posted statement when nothing but a reason is typed', () => {
    const typed = correctionForm.parse({ ...formOfStatement(statement()), reason: 'looked again' });
    const corrected = statementOfForm(typed);
    const { id, revision, source, reason, enteredBy, enteredAt, ...body } = statement();
    expect(corrected).toEqual(body);
    expect(statementBody.safeParse(corrected).success).toBe(true);
  });

  it('names every value it cannot read, each at its own place', () => {
    const values = formOfStatement(statement());
    const [line] = values.lines;
    if (!line) throw new Error('no line');
    const read = correctionForm.safeParse({
      ...values,
      from: '2026-02-30',
      importKwh: 'many',
      lines: [{ ...line, amount: '' }],
    });
    expect(read.error?.issues.map((issue) => issue.path.join('.'))).toEqual([
      'from',
      'importKwh',
      'lines.0.amount',
      'reason',
    ]);
  });

  it('says what a revision changed, value by value, and nothing else', () => {
    const before = statement();
    const [line] = before.lines;
    if (!line) throw new Error('no line');
    const after = statementSchema.parse({
      ...before,
      revision: 2,
      exportWh: 256_000,
      lines: [{ ...line, quantity: '256', amountCents: -2432 }],
      amountDueCents: 4783,
    });
    expect(statementChanges(before, after)).toEqual([
      'Export: 212 kWh → 256 kWh',
      'Excess credit: 212 kWh at 0.0950, −$20.14 → 256 kWh at 0.0950, −$24.32',
      'Due: $52.01 → $47.83',
    ]);
    expect(statementChanges(before, before)).toEqual([]);
  });
});
