import { describe, expect, it } from 'vitest';
import type { ProductionContext } from '#server/importers/contract.ts';
import { readProductionCsv } from '#server/importers/production-csv.ts';
import { PORT_CALDER, readProduction, textFile } from './fixtures.ts';

const encode = (text: string) => new TextEncoder().encode(text);

/** Rows of a day by the hour; `value` gives each hour's cell. */
function hourly(value: (hour: number) => string, date = '2025-06-03', header = 'Time,Production (kWh)'): string {
  const rows = Array.from({ length: 24 }, (_, hour) => `${date} ${String(hour).padStart(2, '0')}:00,${value(hour)}`);
  return `${header}\n${rows.join('\n')}\n`;
}

const noon = (hour: number) => (hour > 6 && hour < 18 ? String(6 - Math.abs(12 - hour)) : '0');

function refusal(bytes: Uint8Array, context: Partial<ProductionContext> = {}): string {
  const result = readProductionCsv({ fileName: 'roof.csv', bytes }, { ...PORT_CALDER, ...context });
  return result.ok ? 'read' : result.problem.code;
}

describe('a file that cannot be read as readings is refused', () => {
  it.each([
    ['nothing', new Uint8Array(0), 'file-empty'],
    ['a spreadsheet', new Uint8Array([0x50, 0x4b, 3, 4, 20, 0]), 'file-wrong-kind'],
    ['NUL bytes', encode('Time,kWh\n2025-01-01\0,1\n'), 'file-wrong-kind'],
    ['too large', new Uint8Array(20_000_001).fill(65), 'file-too-large'],
    ['prose', encode('Dear owner,\nthe roof is doing fine, thank you.\n'), 'file-unreadable'],
    ['one column', encode('Time\n2025-01-01 00:00\n2025-01-01 01:00\n'), 'file-unreadable'],
    ['no dates', encode('a,b\n1,2\n3,4\n'), 'file-unreadable'],
    ['one moment', encode('Time,kWh\n2025-01-01 10:00,1\n'), 'file-unreadable'],
    ['months', encode('Month,kWh\n2025-01-01,300\n2025-02-01,400\n2025-03-01,500\n'), 'file-unreadable'],
    [
      'steps no day is made of',
      encode('Time,kWh\n2025-01-01 00:00,1\n2025-01-01 00:07,1\n2025-01-01 00:14,1\n'),
      'file-unreadable',
    ],
    ['missing marks alone', encode(hourly(() => '-')), 'file-unreadable'],
    [
      'a day a row, its hours across',
      encode(
        `Date,${Array.from({ length: 24 }, (_, h) => `${h}:00`).join(',')}\n2025-01-01,${'1,'.repeat(23)}1\n2025-01-02,${'1,'.repeat(23)}1\n`,
      ),
      'file-unreadable',
    ],
    ['only normalised values', encode(hourly(noon, '2025-06-03', 'Time,Power normalised')), 'file-unreadable'],
  ])('%s', (_, bytes, code) => expect(refusal(bytes)).toBe(code));

  it('and so is a household without a known zone', () => {
    expect(refusal(encode(hourly(noon)), { timeZone: 'Port/Calder' })).toBe('invalid-fields');
  });
});

describe('a row that cannot be read is a fault with its row and column', () => {
  it('and every one is counted while fifty are listed', () => {
    const bad = Array.from({ length: 70 }, (_, at) => `soon ${at},1`).join('\n');
    const reading = readProduction(`${hourly(noon)}${bad}\n`);
    expect(reading.rejectedRows).toHaveLength(70);
    expect(reading.faults).toHaveLength(51);
    expect(reading.faults[0]).toMatchObject({ code: 'not-date', row: 26, column: 'Time', found: 'soon 0' });
    expect(reading.faults.at(-1)?.code).toBe('more-faults');
  });

  it('a value larger than any roof is one, and its step is missing', () => {
    const reading = readProduction(hourly((hour) => (hour === 12 ? '1000001' : noon(hour))));
    expect(reading.faults.map((fault) => [fault.code, fault.row])).toEqual([['too-large', 14]]);
    expect(reading.days[0]?.values[12]).toBeNull();
  });

  it('a row off the file’s steps is one', () => {
    const reading = readProduction(`${hourly(noon)}2025-06-03 12:25,1\n`);
    expect(reading.faults.map((fault) => [fault.code, fault.row])).toEqual([['off-step', 26]]);
  });

  it('a header that is repeated, blank rows and a total row are not', () => {
    const [header = '', ...rows] = hourly(noon).trimEnd().split('\n');
    const text = [header, ...rows.slice(0, 12), '', header, ...rows.slice(12), ',', 'Total,36', 'Average,1.5'].join(
      '\n',
    );
    const reading = readProduction(text);
    expect(reading.rejectedRows).toEqual([]);
    expect([reading.totalWh, reading.statedTotalWh, reading.faults]).toEqual([36_000, 36_000, []]);
  });

  it('a total that the rows do not come to is one', () => {
    const reading = readProduction(`${hourly(noon)}Total,40\n`);
    expect(reading.faults.map((fault) => fault.code)).toEqual(['total-differs']);
    expect([reading.totalWh, reading.statedTotalWh]).toEqual([36_000, 40_000]);
  });
});

describe('what is missing stays missing', () => {
  it.each(['', '-', 'NA', 'n/a', '#N/A', 'null'])('“%s” is not zero', (mark) => {
    const reading = readProduction(hourly((hour) => (hour === 9 ? mark : noon(hour))));
    expect(reading.days[0]?.values[9]).toBeNull();
    expect([reading.missingSteps, reading.acceptedRows, reading.rejectedRows.length]).toEqual([1, 24, 0]);
  });

  it('days that no row speaks of are no days, and their steps are counted as missing', () => {
    const reading = readProduction(`${hourly(noon)}${hourly(noon, '2025-06-06').split('\n').slice(1).join('\n')}`);
    expect(reading.days.map((day) => day.day)).toEqual(['2025-06-03', '2025-06-06']);
    expect(reading.missingSteps).toBe(48);
  });

  it('zeros of whole days at the end count as missing, a zero noon in between does not', () => {
    const day = (date: string, value: (hour: number) => string) => hourly(value, date).split('\n').slice(1).join('\n');
    const text = `${hourly(noon)}${day('2025-06-04', () => '0')}${day('2025-06-05', noon)}${day('2025-06-06', () => '0')}${day('2025-06-07', () => '0')}`;
    const reading = readProduction(text);
    expect(reading.days.map((one) => one.day)).toEqual(['2025-06-03', '2025-06-04', '2025-06-05']);
    expect(reading.doubts.map((doubt) => doubt.field)).toEqual(['energyColumn']);
    expect(readProduction(text, { channel: 'import' }).days).toHaveLength(5);
  });

  it('zeros of a night at the end are zeros', () => {
    const reading = readProduction(`${hourly(noon)}2025-06-04 00:00,0\n2025-06-04 01:00,0\n`);
    expect(reading.days[1]?.values.slice(0, 3)).toEqual([0, 0, null]);
  });
});

describe('negative readings count as nothing and are summed apart', () => {
  it('for a production meter', () => {
    const reading = readProduction(hourly((hour) => (hour === 0 ? '-0.004' : noon(hour))));
    expect([reading.totalWh, reading.clippedNegativeWh]).toEqual([36_000, 4]);
    expect(reading.days[0]?.values[0]).toBe(0);
  });
});

describe('the unit', () => {
  it('is taken from the header, a row of units, the cells or a line above', () => {
    const kwh = (header: string, value = noon) => readProduction(hourly(value, '2025-06-03', header));
    expect(kwh('Time,Energy [Wh]', (hour) => `${noon(hour)}000`).mapping.unit).toBe('Wh');
    expect(kwh('Time,Power').mapping.unit).toBe('kW');
    expect(kwh('Time,Energy', (hour) => `${noon(hour)} kWh`).mapping.unit).toBe('kWh');
    expect(kwh('Unit,kWh\nTime,Energy').mapping.unit).toBe('kWh');
    expect(kwh('Time,Energy\n,kWh').mapping.unit).toBe('kWh');
    expect(kwh('Time,Energy\n,kWh').doubts).toEqual([]);
  });

  it('is doubted where a stated one is out by a thousand against the rating', () => {
    const reading = readProduction(
      hourly((hour) => `${noon(hour)}000`),
      {},
    );
    expect(reading.mapping.unit).toBe('kWh');
    expect(reading.doubts.map((doubt) => [doubt.field, doubt.message.includes('Wh would fit')])).toEqual([
      ['unit', true],
    ]);
  });

  it('is guessed by size where nothing states it, and said to be guessed', () => {
    const reading = readProduction(hourly((hour) => `${noon(hour)}000`, '2025-06-03', 'Time,Output'));
    expect(reading.mapping.unit).toBe('Wh');
    expect(reading.doubts.map((doubt) => doubt.field)).toContain('unit');
  });
});

describe('the channel chooses the column', () => {
  const text = hourly(
    (hour) => `0.4,${noon(hour)},0.1`,
    '2025-06-03',
    'Time,Import (kWh),Production (kWh),Export (kWh)',
  );
  it.each([
    ['production', 2],
    ['monitor', 2],
    ['import', 1],
    ['export', 3],
  ] as const)('%s', (channel, column) => {
    const reading = readProduction(text, { channel });
    expect([reading.mapping.energyColumn, reading.doubts]).toEqual([column, []]);
  });
});

describe('the owner’s mapping overrides what was worked out', () => {
  const text = hourly(
    (hour) => `${noon(hour)},${hour === 12 ? 3 : 0}`,
    '05/06/2025',
    'Time,Inverter 1 kWh,Inverter 2 kWh',
  );
  const first = readProduction(text);

  it('column, unit, order of dates and stamps', () => {
    expect([first.totalWh, first.firstDay, first.mapping.energyColumn]).toEqual([36_000, '2025-05-06', 1]);
    const mapping = { ...first.mapping, energyColumn: 2, unit: 'Wh', dateOrder: 'dmy', stamp: 'end' } as const;
    const again = readProduction(text, { mapping });
    expect([again.totalWh, again.lastDay, again.mapping]).toEqual([3, '2025-06-05', mapping]);
    expect(again.days.at(-1)?.values[11]).toBe(3);
    // The owner's word holds; that it looks a thousand out is still said.
    expect(again.doubts.map((doubt) => doubt.field)).toEqual(['unit']);
  });

  it('a running total can be forced, and its falls are told', () => {
    const again = readProduction(text, { mapping: { ...first.mapping, quantity: 'register' } });
    expect(again.totalWh).toBe(6000);
    expect(again.doubts.map((doubt) => doubt.field)).toEqual(['quantity']);
  });

  it.each([
    [{ energyColumn: 9 }, 'energyColumn'],
    [{ timeColumn: -1 }, 'timeColumn'],
    [{ headerRow: 99 }, 'headerRow'],
    [{ energyColumn: 0 }, 'energyColumn'],
    [{ timeZone: 'Port/Calder' }, 'timeZone'],
  ])('%o does not fit the file', (change, field) => {
    const result = readProductionCsv(textFile(text), { ...PORT_CALDER, mapping: { ...first.mapping, ...change } });
    if (result.ok) throw new Error('it was read');
    expect([result.problem.code, result.problem.faults[0]?.field]).toEqual(['invalid-fields', field]);
  });
});
