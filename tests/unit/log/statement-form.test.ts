import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { StatementBody } from '#shared/api/cycles.ts';
import { type Cents, cents, dollarsText } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { emptyStatementForm } from '#src/features/log/next-statement.ts';
import { exchangedReads } from '#src/ui/statement-form/exchange-reads.ts';
import { runningSum } from '#src/ui/statement-form/running-sum.ts';
import { formOfStatement, statementOfForm } from '#src/ui/statement-form/statement-of-form.ts';
import { emptyLine, emptyRead, isUntouched, statementForm } from '#src/ui/statement-form/statement-values.ts';

const FROM = day('2026-08-14');
const TO = day('2026-09-14');

const BODY: StatementBody = {
  from: FROM,
  to: TO,
  printedDays: 31,
  statementOn: day('2026-09-17'),
  dueOn: day('2026-10-06'),
  reads: [
    {
      meter: 'A1',
      channel: 'import',
      from: FROM,
      to: day('2026-09-01'),
      previous: '08412',
      current: '08600',
      dials: 5,
      multiplier: '1',
      type: 'actual',
      row: 3,
    },
    {
      meter: 'B2',
      channel: 'import',
      from: day('2026-09-01'),
      to: TO,
      previous: '00000',
      current: '00310',
      dials: 5,
      multiplier: '1',
      type: 'estimated',
      row: 4,
    },
  ],
  importWh: wh(498_500),
  exportWh: null,
  productionWh: null,
  lines: [
    {
      component: 'energy',
      kind: 'import',
      label: 'Energy',
      quantity: '498.5',
      unit: 'kWh',
      rate: '0.1684',
      amountCents: cents(8395),
      inDue: true,
      row: 5,
    },
    {
      component: null,
      kind: 'export',
      label: 'Export credit',
      quantity: '212',
      unit: 'kWh',
      rate: '0.0950',
      amountCents: cents(-2014),
      inDue: false,
      row: 6,
    },
  ],
  banks: [
    { bank: 'creditBank', unit: 'USD', open: '31.77', close: '12.00', sentOut: null, sentValueCents: null, row: 7 },
  ],
  previousBalanceCents: cents(4000),
  paymentsCents: cents(-4000),
  amountDueCents: cents(8395),
  budget: null,
};

const NO_BUDGET = { budget: '', budgetSettled: '' };

describe('a statement as a form', () => {
  it('comes back from the form as it went in, a meter exchange and the file’s rows with it', () => {
    const form = formOfStatement(BODY);
    expect(statementForm.safeParse(form).success).toBe(true);
    const back = statementOfForm(form);
    expect({ ...back, reads: [] }).toEqual({ ...BODY, reads: [] });
    expect(back.reads.map((read) => [read.from, read.to, read.type, read.row])).toEqual(
      BODY.reads.map((read) => [read.from, read.to, read.type, read.row]),
    );
  });

  it('keeps each value with its row of the file when another is taken out, and a component it was matched to', () => {
    const form = formOfStatement(BODY);
    const back = statementOfForm({ ...form, lines: form.lines.slice(1), reads: form.reads.slice(1) });
    expect(back.lines.map((line) => [line.label, line.component, line.row])).toEqual([['Export credit', null, 6]]);
    expect(back.reads.map((read) => [read.meter, read.row])).toEqual([['B2', 4]]);
  });

  it('moves the reads with the dates of the statement, but not the day a meter was exchanged', () => {
    const back = statementOfForm({ ...formOfStatement(BODY), to: '2026-09-15' });
    expect(back.reads.map((read) => [read.from, read.to])).toEqual([
      [FROM, '2026-09-01'],
      ['2026-09-01', '2026-09-15'],
    ]);
  });

  it('neither asks for nor takes in a line or read that was laid out and left empty', () => {
    const form = formOfStatement(BODY);
    const laidOut = {
      ...form,
      lines: [...form.lines, { ...emptyLine(), label: 'City tax' }],
      reads: [...form.reads, emptyRead()],
    };
    expect(statementForm.safeParse(laidOut).success).toBe(true);
    expect(statementOfForm(laidOut)).toEqual(statementOfForm(form));
    const begun = {
      ...laidOut,
      reads: [{ ...emptyRead(), current: '12' }],
      lines: [{ ...emptyLine(), quantity: '1' }],
    };
    expect(statementForm.safeParse(begun).error?.issues.map((issue) => issue.path.join('.'))).toEqual([
      'reads.0.meter',
      'reads.0.previous',
      'lines.0.label',
      'lines.0.amount',
    ]);
  });

  it('lays the next statement out from the last: reads, balance and bank follow on, a meter taken out does not', () => {
    const next = emptyStatementForm(null, BODY);
    expect(next).toMatchObject({ from: '2026-09-14', previousBalance: '83.95', due: '' });
    expect(next.reads).toMatchObject([{ meter: 'B2', previous: '00310', current: '', type: 'actual' }]);
    expect(next.banks).toMatchObject([{ bank: 'creditBank', open: '12.00', close: '' }]);
    expect(next.lines.map((line) => [line.label, line.amount, line.inDue])).toEqual([
      ['Energy', '', true],
      ['Export credit', '', false],
    ]);
    expect(next.lines.every(isUntouched)).toBe(true);
  });

  it('adds the lines in the amount due, the balance and the payments in whole cents', () => {
    const amounts = fc.array(fc.record({ amount: fc.integer({ min: -999_999, max: 999_999 }), inDue: fc.boolean() }), {
      maxLength: 30,
    });
    fc.assert(
      fc.property(amounts, fc.integer({ min: -99_999, max: 99_999 }), (typed, balance) => {
        const lines = typed.map(({ amount, inDue }) => ({
          ...emptyLine(),
          label: 'x',
          amount: dollarsText(amount as Cents),
          inDue,
        }));
        const expected = typed.reduce((sum, { amount, inDue }) => sum + (inDue ? amount : 0), balance);
        const sum = runningSum({
          ...NO_BUDGET,
          lines,
          previousBalance: dollarsText(balance as Cents),
          payments: '',
          due: '1.00',
        });
        expect(sum).toEqual({ linesCents: expected === 0 ? 0 : expected, dueCents: 100, unread: 0 });
      }),
    );
  });

  it('does not pass a line it cannot read off as nothing', () => {
    const sum = runningSum({
      ...NO_BUDGET,
      lines: [{ ...emptyLine(), label: 'x', amount: '12.x' }],
      previousBalance: '',
      payments: '',
      due: '',
    });
    expect(sum).toEqual({ linesCents: 0, dueCents: null, unread: 1 });
  });
});

describe('a statement on a budget plan, typed', () => {
  const filled = () => formOfStatement({ ...BODY });
  const changedBy = (changes: Partial<ReturnType<typeof filled>>) => ({ ...filled(), ...changes });

  it('comes back as it was typed, settlement and credit sent on with it', () => {
    const budget = { instalmentCents: cents(11_800), balanceCents: cents(-6412), settledCents: null };
    const banks = BODY.banks.map((bank) => ({ ...bank, sentOut: '4.5', sentValueCents: cents(431) }));
    const stated = { ...BODY, budget, banks };
    const made = statementOfForm(formOfStatement(stated));
    expect([made.budget, made.banks]).toEqual([budget, banks]);
    expect(statementOfForm(filled()).budget).toBeNull();
  });

  it('asks for the budget amount where only its balance is typed, and for the real charges', () => {
    const messages = (form: ReturnType<typeof filled>) =>
      statementForm.safeParse(form).error?.issues.map((one) => one.message);
    expect(messages(changedBy({ budgetBalance: '-64.12' }))).toEqual(['Write the budget amount of this bill too.']);
    expect(messages(changedBy({ budget: '118.00', lines: [] }))).toEqual([
      'Add the real charges as lines above: the amount due does not say them.',
    ]);
    expect(messages(changedBy({ budget: '118.00', budgetSettled: '-12.50' }))).toBeUndefined();
  });

  it('adds the budget amount, its settlement and what is no electricity, and not the real charges', () => {
    const line = (kind: 'import' | 'otherService', amount: string) => ({ ...emptyLine(), kind, label: kind, amount });
    const sum = runningSum({
      lines: [line('import', '104.24'), line('otherService', '41.15')],
      previousBalance: '10.00',
      payments: '-10.00',
      due: '146.65',
      budget: '118.00',
      budgetSettled: '-12.50',
    });
    expect(sum).toEqual({ linesCents: 14_665, dueCents: 14_665, unread: 0 });
  });
});

describe('a meter that was exchanged, typed', () => {
  it('splits every register of the old meter at the day and lays out the new one’s', () => {
    const reads = exchangedReads(
      [
        { ...emptyRead({ meter: 'A', dials: '5', multiplier: '40' }), previous: '100' },
        { ...emptyRead({ meter: 'P', dials: '6', multiplier: '1' }), channel: 'production', previous: '7' },
        { ...emptyRead({ meter: 'A', dials: '5', multiplier: '40' }), channel: 'export', previous: '200' },
      ],
      'A',
      'B',
      '2026-09-23',
    );
    expect(reads.map((read) => [read.meter, read.channel, read.from, read.to, read.previous, read.multiplier])).toEqual(
      [
        ['A', 'import', '', '2026-09-23', '100', '40'],
        ['B', 'import', '2026-09-23', '', '', '40'],
        ['P', 'production', '', '', '7', '1'],
        ['A', 'export', '', '2026-09-23', '200', '40'],
        ['B', 'export', '2026-09-23', '', '', '40'],
      ],
    );
  });
});
