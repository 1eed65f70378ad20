import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readStatementCsv } from '#server/importers/statement-csv.ts';
import { statementTemplateCsv } from '#server/importers/statement-template.ts';
import { textFile } from './fixtures.ts';

const HEADER = 'service_from,service_to,record,item,amount,statement_date,due_date,days';
const DUE = '2025-05-14,2025-06-13,balance,amount due,80.00';

function read(text: string, keepGoodRows = false) {
  const result = readStatementCsv(textFile(text, 'june.csv'), { keepGoodRows });
  if (!result.ok) throw new Error(`not read: ${result.problem.code}`);
  return result.value;
}

function refusal(bytes: Uint8Array): string {
  const result = readStatementCsv({ fileName: 'june.csv', bytes }, { keepGoodRows: true });
  return result.ok ? 'read' : result.problem.code;
}

describe('a file that is no statement CSV is refused, saying what it is', () => {
  it.each([
    ['nothing', new Uint8Array(0), 'file-empty'],
    ['blank lines', new TextEncoder().encode('\n \r\n'), 'file-empty'],
    ['comments alone', new TextEncoder().encode('# only this\n'), 'file-unreadable'],
    ['a zip or spreadsheet', new Uint8Array([0x50, 0x4b, 3, 4, 20, 0]), 'file-wrong-kind'],
    ['an older spreadsheet', new Uint8Array([0xd0, 0xcf, 0x11, 0xe0, 0xa1]), 'file-wrong-kind'],
    ['a PDF', new TextEncoder().encode('%PDF-1.7\n'), 'file-wrong-kind'],
    ['a web page', new TextEncoder().encode('<!doctype html><p>service_from</p>'), 'file-wrong-kind'],
    ['NUL bytes', new TextEncoder().encode(`${HEADER}\n\0\n`), 'file-wrong-kind'],
    ['too large', new TextEncoder().encode(`${HEADER}\n${'x'.repeat(2_000_001)}`), 'file-too-large'],
    ['another table', new TextEncoder().encode('from,to,amount\n1,2,3\n'), 'file-unreadable'],
  ])('%s', (_, bytes, code) => expect(refusal(bytes)).toBe(code));
});

describe('a fault names the file, the row, the column and the text found', () => {
  it('for an amount', () => {
    const { faults, statements, table } = read(`${HEADER}\n${DUE}\n2025-05-14,2025-06-13,line,import,12.3.4\n`);
    expect(faults).toEqual([
      {
        code: 'not-money',
        field: 'amount',
        fileName: 'june.csv',
        row: 3,
        column: 'amount',
        found: '12.3.4',
        message: 'Row 3, amount: “12.3.4” is not an amount of money. Write it like 12.34 or −12.34.',
      },
    ]);
    expect(statements).toEqual([]);
    expect(table.rows[1]?.faults).toEqual(faults);
  });

  it('and long text found is shortened', () => {
    const [fault] = read(`${HEADER}\n${DUE}\n2025-05-14,2025-06-13,line,import,${'9x'.repeat(500)}\n`).faults;
    expect(fault?.found?.length).toBeLessThanOrEqual(60);
    expect(fault?.message.length).toBeLessThan(200);
  });
});

describe('good rows of a partly bad file are kept only when the owner says so', () => {
  const text = `${HEADER}\n${DUE}\n2025-05-14,2025-06-13,line,import,abc\n2025-05-14,2025-06-13,line,tax,1.00\n`;

  it('not before', () => expect(read(text).statements).toEqual([]));

  it('and then without the bad row, which stays a fault', () => {
    const kept = read(text, true);
    expect(kept.statements.map((one) => one.statement.lines.map((line) => line.kind))).toEqual([['tax']]);
    expect(kept.faults).toHaveLength(1);
  });

  it('but a cycle whose amount due is the bad row does not stand', () => {
    const kept = read(`${HEADER}\n2025-05-14,2025-06-13,balance,amount due,abc\n`, true);
    expect(kept.statements).toEqual([]);
    expect(kept.faults.map((fault) => fault.code).sort()).toEqual(['no-amount-due', 'not-money']);
  });
});

describe('dates of a statement belong to its cycle', () => {
  it.each([
    ['a statement dated before its cycle', `${DUE},2025-05-02,,`, 'outside-cycle', 'statement_date'],
    ['a due date years off', `${DUE},,2027-07-07,`, 'outside-cycle', 'due_date'],
    ['a due date before the cycle', `${DUE},,2025-05-01,`, 'outside-cycle', 'due_date'],
    ['days that are no number', `${DUE}\n2025-05-14,2025-06-13,line,tax,1.00,,,thirty`, 'not-whole', 'days'],
    [
      'two statement dates',
      `${DUE},2025-06-16,,\n2025-05-14,2025-06-13,line,tax,1.00,2025-06-17,,`,
      'two-values',
      'statement_date',
    ],
  ])('%s', (_, rows, code, column) => {
    const { faults } = read(`${HEADER}\n${rows}\n`);
    expect(faults.map((fault) => [fault.code, fault.column])).toEqual([[code, column]]);
  });
});

describe('the layout', () => {
  it('takes column names in any case, with spaces', () => {
    const text = 'Service From, SERVICE TO ,Record,Item,Amount\n2025-05-14,2025-06-13,Balance,Amount Due,80\n';
    expect(read(text).statements[0]?.statement.amountDueCents).toBe(8000);
  });

  it('says when a column stands twice, and when a header has no rows', () => {
    expect(read(`${HEADER},amount\n${DUE}\n`).faults.map((fault) => fault.code)).toEqual(['column-twice']);
    expect(read(`${HEADER}\n`).faults.map((fault) => fault.code)).toEqual(['no-rows']);
  });

  it('says where a quotation mark is not closed', () => {
    expect(
      read(`${HEADER}\n${DUE}\n2025-05-14,2025-06-13,line,"import,2.00\n`).faults.map((fault) => fault.code),
    ).toContain('quotes');
  });

  it('an export credit is part of the amount due, unless a USD bank or the row says otherwise', () => {
    const line = '2025-05-14,2025-06-13,line,export credit,-5.00';
    const inDue = (text: string) => read(text).statements[0]?.statement.lines[0]?.inDue;
    const bank = 'service_from,service_to,record,item,amount,unit,previous,in_due';
    expect(inDue(`${HEADER}\n${DUE}\n${line}\n`)).toBe(true);
    expect(inDue(`${bank}\n${DUE}\n${line}\n2025-05-14,2025-06-13,bank,,,USD,1.00\n`)).toBe(false);
    expect(inDue(`${bank}\n${DUE}\n${line},,,yes\n2025-05-14,2025-06-13,bank,,,USD,1.00\n`)).toBe(true);
    expect(inDue(`${bank}\n${DUE}\n${line}\n2025-05-14,2025-06-13,bank,,,kWh,1.00\n`)).toBe(true);
  });

  it('payments take off what is owed, whichever sign the statement prints, and add up', () => {
    const text = `${HEADER}\n${DUE}\n,,balance,payments,20.00\n,,balance,payment received,-5.00\n`;
    expect(read(text).statements[0]?.statement.paymentsCents).toBe(-2500);
  });

  it('lists at most 200 faults and says how many more there are, and shows at most 400 rows', () => {
    const rows = Array.from({ length: 900 }, () => '2025-05-14,2025-06-13,line,tax,x').join('\n');
    const { faults, table } = read(`${HEADER}\n${DUE}\n${rows}\n`);
    expect(faults).toHaveLength(201);
    expect(faults.at(-1)?.message).toBe('700 more faults are not listed.');
    expect([table.rows.length, table.more]).toEqual([400, 501]);
  });
});

describe('the template', () => {
  it('reads without a fault, and its example adds up to its amount due', () => {
    const { statements, faults } = read(statementTemplateCsv());
    expect(faults).toEqual([]);
    const statement = statements[0]?.statement;
    if (!statement) throw new Error('the template has an example');
    const lines = statement.lines.filter((line) => line.inDue).reduce((sum, line) => sum + line.amountCents, 0);
    expect((statement.previousBalanceCents ?? 0) + (statement.paymentsCents ?? 0) + lines).toBe(
      statement.amountDueCents,
    );
  });

  it('is the file the guide links to', () => {
    expect(readFileSync('fixtures/statements/template.csv', 'utf8')).toBe(statementTemplateCsv());
  });
});
