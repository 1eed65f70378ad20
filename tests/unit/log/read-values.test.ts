import { describe, expect, it } from 'vitest';
import type { StatementBody } from '#shared/api/cycles.ts';
import type { DraftStatement, SourceTable } from '#shared/api/log.ts';
import type { FacingLine } from '#shared/ledger/cycle.ts';
import type { Check } from '#shared/reconcile/check.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { countValues, readValues } from '#src/features/log/read-values.ts';
import { paperRows, rowsOfStatement } from '#src/features/log/source-rows.ts';

const FROM = day('2026-08-14');
const TO = day('2026-09-14');

function statement(changes: Partial<StatementBody> = {}): StatementBody {
  return {
    from: FROM,
    to: TO,
    printedDays: 31,
    statementOn: null,
    dueOn: null,
    reads: [
      {
        meter: 'A1',
        channel: 'import',
        from: FROM,
        to: TO,
        previous: '8412',
        current: '8910',
        dials: 5,
        multiplier: '1',
        type: 'actual',
        row: 3,
      },
    ],
    importWh: wh(498_000),
    exportWh: null,
    productionWh: null,
    lines: [
      {
        component: null,
        kind: 'import',
        label: 'Energy',
        quantity: '498',
        unit: 'kWh',
        rate: '0.1684',
        amountCents: cents(8386),
        inDue: true,
        row: 4,
      },
      {
        component: null,
        kind: 'adjustment',
        label: 'Storm rider',
        quantity: null,
        unit: null,
        rate: null,
        amountCents: cents(304),
        inDue: true,
        row: 5,
      },
    ],
    banks: [],
    previousBalanceCents: null,
    paymentsCents: null,
    amountDueCents: cents(8690),
    budget: null,
    ...changes,
  };
}

function check(changes: Partial<Check> & Pick<Check, 'check'>): Check {
  const about = changes.about ?? '';
  return {
    about,
    key: `${changes.check}:${about}`,
    title: 'A check',
    verdict: 'agrees',
    stated: null,
    found: null,
    difference: null,
    tolerance: null,
    unit: 'USD',
    cause: null,
    advice: null,
    accepted: null,
    ...changes,
  };
}

function facing(key: string, label: string, amount: number, withOurs: boolean): FacingLine {
  const side = { quantity: null, rate: null, amountCents: cents(amount), inDue: true };
  const working = { words: '', formula: 'a', inputs: [], unit: 'USD', basis: 'computed' as const };
  return {
    key,
    label,
    unit: null,
    billed: side,
    ours: withOurs ? { ...side, working } : null,
    differenceCents: null,
    verdict: 'agrees',
  };
}

function draft(changes: Partial<DraftStatement> = {}): DraftStatement {
  return {
    key: 'k',
    fileName: 'september.csv',
    documentId: 'd',
    statement: statement(),
    edited: false,
    replaces: null,
    alreadyPosted: false,
    checks: [],
    facing: [facing('line:energy:0', 'Energy', 8386, true), facing('printed:1', 'Storm rider', 304, true)],
    billedDueCents: cents(8690),
    oursDueCents: null,
    ...changes,
  };
}

const valueAt = (drafted: DraftStatement, key: string) => {
  const found = readValues(drafted).values.find((one) => one.key === key);
  if (!found) throw new Error(`no value ${key}`);
  return found;
};

describe('what was read, with its verdicts', () => {
  it('puts a price check beside the line it concerns, found by the plan’s component it faces', () => {
    const drafted = draft({
      checks: [check({ check: 'linePrice', about: 'energy', verdict: 'differs', difference: '-4.31' })],
    });
    expect(valueAt(drafted, 'line0')).toMatchObject({ tone: 'no', verdict: 'differs, $4.31', doubtful: true });
  });

  it('calls a line that the rate plan does not have a new line', () => {
    expect(valueAt(draft(), 'line1')).toMatchObject({ verdict: 'new line', doubtful: true });
  });

  it('calls nothing new where there is no plan to compare with, nor a line that is not electricity', () => {
    expect(valueAt(draft({ facing: [facing('printed:1', 'Storm rider', 304, true)] }), 'line1').doubtful).toBe(false);
    const water = statement();
    water.lines = water.lines.map((line) => ({ ...line, kind: line.label === 'Energy' ? line.kind : 'otherService' }));
    expect(valueAt(draft({ statement: water }), 'line1').doubtful).toBe(false);
  });

  it('lets an accepted difference rest', () => {
    const accepted = { note: 'Asked them.', by: 'Priya', on: '2026-09-20' };
    const drafted = draft({
      checks: [check({ check: 'linesAddUp', verdict: 'differs', difference: '3.04', accepted })],
    });
    expect(valueAt(drafted, 'due').doubtful).toBe(false);
  });

  it('says one cause once where two checks fail for it', () => {
    const cause = 'The lines come to $89.94; the statement asks for $86.90.';
    const checks = [
      check({ check: 'linesAddUp', verdict: 'differs', cause }),
      check({ check: 'amountDue', verdict: 'differs', cause }),
    ];
    expect(valueAt(draft({ checks }), 'due').notes).toHaveLength(1);
  });

  it('loses no differing check: what stands beside no value is listed apart', () => {
    const bank = check({ check: 'bankChain', about: 'creditBank', verdict: 'differs' });
    expect(readValues(draft({ checks: [bank] })).otherChecks).toEqual([bank]);
  });

  it('counts single values, and rows that need an eye', () => {
    expect(countValues(readValues(draft()).values)).toEqual({ read: 8, doubtful: 1 });
  });

  it('puts a changed value into the statement in whole cents, or says what to write', () => {
    const [field] = valueAt(draft(), 'line0').fields;
    const changed = field?.put('20.14 CR');
    expect(typeof changed === 'object' && changed.lines[0]?.amountCents).toBe(-2014);
    expect(field?.put('lots')).toBe('Write an amount such as 14.50.');
  });

  it('moves reads that ran over the whole cycle with its dates', () => {
    const to = valueAt(draft(), 'dates').fields[1]?.put('2026-09-15');
    expect(typeof to === 'object' && to.reads[0]?.to).toBe('2026-09-15');
    expect(valueAt(draft(), 'dates').fields[1]?.put('2026-08-14')).toMatch(/must come after/);
  });
});

describe('the file beside what was read', () => {
  const table: SourceTable = {
    header: ['service_from', 'service_to', 'record', 'item', 'label', 'amount', 'in_due'],
    rows: [
      { row: 2, cells: ['2026-07-14', '2026-08-14', 'line', 'energy', 'Energy', '70.00', 'yes'], faults: [] },
      { row: 3, cells: ['2026-08-14', '2026-09-14', 'read', 'import', '', '', ''], faults: [] },
      { row: 4, cells: ['2026-08-14', '2026-09-14', 'line', 'energy', 'Energy', '83.86', 'no'], faults: [] },
      { row: 6, cells: ['2026-08-14', '2026-09-14', 'balance', 'amount due', '', '86.90', ''], faults: [] },
    ],
    more: 0,
  };

  it('takes the rows with the statement’s own dates, named by a value or not', () => {
    expect(rowsOfStatement(table, statement())).toEqual([3, 4, 6]);
  });

  it('shows service dates once and every other value in its row', () => {
    const rows = paperRows(table, [3, 4, 6]);
    expect(rows.map((row) => row.values.map((value) => value.text))).toEqual([
      ['2026-08-14', '2026-09-14'],
      ['83.86'],
      ['86.90'],
    ]);
    expect(rows[1]?.words).toEqual(['line', 'energy', 'Energy', 'in due no']);
  });
});
