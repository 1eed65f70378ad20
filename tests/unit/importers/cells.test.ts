import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decimalMarkOfColumn, readScaled } from '#server/importers/amount-text.ts';
import { stampReader } from '#server/importers/stamp-text.ts';
import { decimalMarkOf, readDate, readMoney, readNumber } from '#server/importers/statement-cells.ts';
import { cents, dollarsText } from '#shared/units/cents.ts';

describe('money on a statement', () => {
  it.each([
    ['12.34', 1234],
    ['−12.34', -1234],
    ['-$12.34', -1234],
    ['$-12.34', -1234],
    ['12.34-', -1234],
    ['(12.34)', -1234],
    ['12.34 CR', -1234],
    ['12.34CR', -1234],
    ['$1,204.50', 120450],
    ['0', 0],
    ['.5', 50],
  ])('%s', (text, expected) => expect(readMoney(text, '.')).toBe(expected));

  it.each(['12,34', '1,2,3', '12.345', '--1', '(1', '1)', '-5 CR', '(-5)', 'x', '$', '1e3', '12.34.5', ' '])(
    '“%s” is none',
    (text) => {
      expect(readMoney(text, '.')).toBeNull();
    },
  );

  it('reads back whatever is written, with a point or with a comma', () => {
    fc.assert(
      fc.property(fc.integer({ min: -1e11, max: 1e11 }), (amount) => {
        const text = dollarsText(cents(amount));
        expect(readMoney(text, '.')).toBe(amount);
        expect(readMoney(text.replace('.', ','), ',')).toBe(amount);
      }),
      { numRuns: 1000 },
    );
  });
});

describe('numbers on a statement', () => {
  it.each([
    ['0.0920', '0.0920'],
    ['00498', '498'],
    ['1,284.5', '1284.5'],
    ['6.25%', '0.0625'],
    ['16.84 ¢', '0.1684'],
    ['$0.1684/kWh', '0.1684'],
    ['498 kWh', '498'],
    ['1.2E-05', '0.000012'],
    ['−3', '-3'],
    ['-0.00', '0.00'],
  ])('%s', (text, expected) => expect(readNumber(text, '.')).toBe(expected));

  it.each(['12,34', 'x', '1 2 x', '1234567890123', '0.1234567890123', '1E99', '1..2'])('“%s” is none', (text) => {
    expect(readNumber(text, '.')).toBeNull();
  });
});

describe('dates on a statement', () => {
  it.each([
    ['2025-08-14', '2025-08-14'],
    ['2025-8-4', '2025-08-04'],
    ['8/14/2025', '2025-08-14'],
    ['08/04/25', '2025-08-04'],
    ['2/29/2024', '2024-02-29'],
  ])('%s', (text, expected) => expect(readDate(text)).toBe(expected));

  it.each(['2025-02-30', '14/8/2025', '2/29/2025', '8/14', 'Aug 14, 2025', '20250814', '0/1/2025'])(
    '“%s” is none',
    (text) => {
      expect(readDate(text)).toBeNull();
    },
  );
});

describe('the decimal mark of a file', () => {
  it('is a comma only where cells are not divided by commas and a number can be read no other way', () => {
    expect(decimalMarkOf(';', ['2025-05-14', '12,34'])).toBe(',');
    expect(decimalMarkOf(',', ['12,34'])).toBe('.');
    expect(decimalMarkOf(';', ['1,234'])).toBe('.');
    expect(decimalMarkOf(';', ['12,34', '12.34'])).toBe('.');
  });

  it('of a column of readings is settled over all of it, and said to be uncertain where it cannot be', () => {
    expect(decimalMarkOfColumn(['0,697', '1,204'], ';')).toEqual({ mark: ',', certain: true });
    expect(decimalMarkOfColumn(['1,204', '2,310'], ';')).toEqual({ mark: ',', certain: false });
    expect(decimalMarkOfColumn(['1,204', '2,310'], ',')).toEqual({ mark: '.', certain: false });
    expect(decimalMarkOfColumn(['1.204', '2.310'], ',')).toEqual({ mark: '.', certain: true });
    expect(decimalMarkOfColumn(['12', '7'], ';')).toEqual({ mark: '.', certain: true });
  });
});

describe('readings as exact counts', () => {
  it.each([
    ['1.5', 1_500_000],
    ['-2.8601', -2_860_100],
    ['="12"', 12_000_000],
    ['12.4 kWh', 12_400_000],
    ['(3.1)', -3_100_000],
    ["1'204", 1_204_000_000],
    ['1 204,5', undefined],
    ['1,204.5', 1_204_500_000],
    ['1.2e-3', 1200],
    ['1.23E2', 123_000_000],
    ['0.0000005', 1],
    ['0.0000004', 0],
    ['.5', 500_000],
    ['−3', -3_000_000],
    ['-', null],
    ['', null],
    ['N/A', null],
    ['3.4x', undefined],
    ['1.2.3', undefined],
    ['99999999999', undefined],
  ])('%s', (text, expected) => expect(readScaled(text, '.', 6)).toBe(expected));

  it('reads any decimal of up to six places exactly, the quick way and the dressed way alike', () => {
    fc.assert(
      fc.property(fc.integer({ min: -1e12, max: 1e12 }), (micro) => {
        const size = Math.abs(micro);
        const text = `${micro < 0 ? '-' : ''}${Math.floor(size / 1e6)}.${String(size % 1e6).padStart(6, '0')}`;
        expect(readScaled(text, '.', 6)).toBe(micro);
        expect(readScaled(`${text} kWh`, '.', 6)).toBe(micro);
        expect(readScaled(text.replace('.', ','), ',', 6)).toBe(micro);
        expect(readScaled(`${text}e0`, '.', 6)).toBe(micro);
      }),
      { numRuns: 1000 },
    );
  });
});

describe('stamps', () => {
  const at = (text: string, order: 'ymd' | 'mdy' | 'dmy' = 'mdy', numbers: 'epoch' | 'serial' | null = null) => {
    const stamp = stampReader(order, numbers)(text);
    if (stamp === null) return null;
    const written = new Date((stamp.day * 86_400 + stamp.second) * 1000).toISOString().slice(0, 19);
    return stamp.offset === null ? written : `${written} ${stamp.offset / 60}`;
  };

  it.each([
    ['2025-07-01 00:15:00-07:00', '2025-07-01T00:15:00 -420'],
    ['2025-07-01T00:15:00Z', '2025-07-01T00:15:00 0'],
    ['2025-07-01T00:15:00.000+0530', '2025-07-01T00:15:00 330'],
    ['2025/7/1 0:15', '2025-07-01T00:15:00'],
    ['7/1/2025 12:15 AM', '2025-07-01T00:15:00'],
    ['7/1/2025 12:15:30 p.m.', '2025-07-01T12:15:30'],
    ['7/1/25 1:15pm', '2025-07-01T13:15:00'],
    ['07/01/2025 24:00', '2025-07-02T00:00:00'],
    ['Jul 1, 2025 13:00', '2025-07-01T13:00:00'],
    ['Tue, 1 Jul 2025 13:00 MST', '2025-07-01T13:00:00 -420'],
    ['01-Jul-2025', '2025-07-01T00:00:00'],
    ['20250701', '2025-07-01T00:00:00'],
    ['20250701T0015', '2025-07-01T00:15:00'],
    ['="2025-07-01 00:15"', '2025-07-01T00:15:00'],
  ])('%s', (text, expected) => expect(at(text)).toBe(expected));

  it('take the order of day and month from the mapping', () => {
    expect(at('03/04/2025 10:00', 'mdy')).toBe('2025-03-04T10:00:00');
    expect(at('03/04/2025 10:00', 'dmy')).toBe('2025-04-03T10:00:00');
    expect(at('25-04-03 10:00', 'ymd')).toBe('2025-04-03T10:00:00');
  });

  it('may be bare numbers where the column holds such', () => {
    expect(at('1751328900', 'ymd', 'epoch')).toBe('2025-07-01T00:15:00 0');
    expect(at('1751328900000', 'ymd', 'epoch')).toBe('2025-07-01T00:15:00 0');
    expect(at('45839.0104166667', 'ymd', 'serial')).toBe('2025-07-01T00:15:00');
    expect(at('1751328900')).toBeNull();
  });

  it.each([
    '2025-02-30 10:00',
    '13/13/2025',
    '7/1/2025 25:00',
    '7/1/2025 13:00 PM',
    '7/1/2025 24:15',
    '10:00',
    'Total',
    '',
    '7/1/2025 10:61',
    '3025-01-01',
  ])('“%s” is none', (text) => expect(at(text)).toBeNull());
});
