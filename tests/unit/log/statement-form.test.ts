import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { StatementBody } from '#shared/api/cycles.ts';
import { type Cents, cents, dollarsText } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { emptyStatementForm } from '#src/features/log/next-statement.ts';
import {
  emptyLine,
  formOfStatement,
  isUntouched,
  runningSum,
  statementForm,
  statementOfForm,
} from '#src/features/log/statement-form-values.ts';

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
  banks: [{ bank: 'creditBank', unit: 'USD', open: '31.77', close: '12.00', row: 7 }],
  previousBalanceCents: cents(4000),
  paymentsCents: cents(-4000),
  amountDueCents: cents(8395),
};

describe('a statement as a form', () => {
  it('comes back from the form as it went in, a meter exchange and the file’s rows with it', () => {
    const form = formOfStatement(BODY);
    expect(statementForm.safeParse(form).success).toBe(true);
    const back = statementOfForm(form, BODY);
    expect({ ...back, reads: [] }).toEqual({ ...BODY, reads: [] });
    expect(back.reads.map((read) => [read.from, read.to, read.type, read.row])).toEqual(
      BODY.reads.map((read) => [read.from, read.to, read.type, read.row]),
    );
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
        const sum = runningSum({ lines, previousBalance: dollarsText(balance as Cents), payments: '', due: '1.00' });
        expect(sum).toEqual({ linesCents: expected === 0 ? 0 : expected, dueCents: 100, unread: 0 });
      }),
    );
  });

  it('does not pass a line it cannot read off as nothing', () => {
    const sum = runningSum({
      lines: [{ ...emptyLine(), label: 'x', amount: '12.x' }],
      previousBalance: '',
      payments: '',
      due: '',
    });
    expect(sum).toEqual({ linesCents: 0, dueCents: null, unread: 1 });
  });
});
