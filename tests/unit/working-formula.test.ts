import { describe, expect, it } from 'vitest';
import type { Working } from '#shared/working.ts';
import { evaluateWorking } from '#shared/working-formula.ts';

const rule = { kind: 'rule', name: 'Test', version: '' } as const;

function working(formula: string, inputs: Record<string, string | string[]>): Working {
  return {
    words: '',
    formula,
    unit: 'USD',
    basis: 'computed',
    inputs: Object.entries(inputs).map(([name, value]) => ({ name, label: name, value, unit: '', source: rule })),
  };
}

describe('a working', () => {
  it('is evaluated from its inputs alone, with the usual precedence', () => {
    expect(evaluateWorking(working('a + b * c', { a: '1', b: '2', c: '3' })).toString()).toBe('7');
    expect(evaluateWorking(working('(a + b) * -c / 4', { a: '1', b: '2', c: '3' })).toString()).toBe('-2.25');
    expect(evaluateWorking(working('a - b - c', { a: '9', b: '3', c: '2' })).toString()).toBe('4');
  });

  it('rounds half away from zero to the cent', () => {
    expect(evaluateWorking(working('roundCents(q * r)', { q: '498', r: '0.1684' })).toString()).toBe('83.86');
    expect(evaluateWorking(working('roundCents(x)', { x: '-0.125' })).toString()).toBe('-0.13');
    expect(evaluateWorking(working('roundCentsEven(x)', { x: '0.125' })).toString()).toBe('0.12');
    expect(evaluateWorking(working('roundWhole(x)', { x: '2.5' })).toString()).toBe('3');
  });

  it('adds lists and takes the least and the most', () => {
    expect(evaluateWorking(working('sum(list) - max(list, 0)', { list: ['1.5', '-2', '4'] })).toString()).toBe('-0.5');
    expect(evaluateWorking(working('sum(none)', { none: [] })).toString()).toBe('0');
    expect(evaluateWorking(working('min(list, 0)', { list: ['1', '2'] })).toString()).toBe('0');
  });

  it('says what it cannot read', () => {
    for (const formula of ['a +', 'unknown', 'a b', '(a', 'shout(a)', 'a; b', 'list + 1']) {
      expect(() => evaluateWorking(working(formula, { a: '1', list: ['1'] }))).toThrow();
    }
  });
});
