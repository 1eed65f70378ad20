import { Decimal } from 'decimal.js';
import { paybackYears, presentValue, rateOfReturn } from './position/economics.ts';
import { Exact, exact } from './units/rate.ts';
import type { Working } from './working.ts';

type Value = Exact | Exact[];

/**
 * Evaluates a working from its inputs alone: + − * / and brackets over the inputs' names and plain numbers, and
 * `roundCents(x)` (half away from zero to 0.01), `roundCentsEven(x)`, `roundWhole(x)`, `roundTo(x, n)` to n decimals, `sum(list)`, `min(…)`, `max(…)`,
 * `pow(x, n)` with a whole n; over yearly sums, the first undiscounted: `npv(rate, list)`, `payback(rate, list)`, `irr(list)`.
 * Throws on a formula it cannot read or a name it does not know: a working must always be readable.
 */
export function evaluateWorking(working: Working): Exact {
  const names = new Map<string, Value>();
  for (const input of working.inputs) {
    names.set(input.name, Array.isArray(input.value) ? input.value.map(exact) : exact(input.value));
  }
  const tokens = tokenize(working.formula);
  let at = 0;

  function expression(): Value {
    let left = product();
    while (tokens[at] === '+' || tokens[at] === '-') {
      const sign = tokens[at++];
      const right = scalar(product());
      left = sign === '+' ? scalar(left).plus(right) : scalar(left).minus(right);
    }
    return left;
  }

  function product(): Value {
    let left = atom();
    while (tokens[at] === '*' || tokens[at] === '/') {
      const sign = tokens[at++];
      const right = scalar(atom());
      left = sign === '*' ? scalar(left).times(right) : scalar(left).div(right);
    }
    return left;
  }

  function atom(): Value {
    const token = tokens[at++];
    if (token === undefined) throw unreadable('it ends too early');
    if (token === '-') return scalar(atom()).negated();
    if (token === '(') {
      const inner = expression();
      expect(')');
      return inner;
    }
    if (/^\d/.test(token)) return new Exact(token);
    if (tokens[at] === '(') {
      at += 1;
      const given: Value[] = [];
      if (tokens[at] !== ')') {
        given.push(expression());
        while (tokens[at] === ',') {
          at += 1;
          given.push(expression());
        }
      }
      expect(')');
      return call(token, given);
    }
    const value = names.get(token);
    if (value === undefined) throw unreadable(`it names ${token}, which is not an input`);
    return value;
  }

  function expect(token: string): void {
    if (tokens[at] !== token) throw unreadable(`“${token}” is missing`);
    at += 1;
  }

  function unreadable(why: string): Error {
    return new Error(`the working “${working.formula}” cannot be evaluated: ${why}`);
  }

  const result = scalar(expression());
  if (at !== tokens.length) throw unreadable('something is left over');
  return result;
}

function scalar(value: Value): Exact {
  if (Array.isArray(value)) throw new Error('a list stands where a number belongs');
  return value;
}

function call(name: string, given: Value[]): Exact {
  const list = given.flat();
  const first = list[0];
  switch (name) {
    case 'sum':
      return list.reduce((total, value) => total.plus(value), new Exact(0));
    case 'min':
      return Exact.min(...list);
    case 'max':
      return Exact.max(...list);
    case 'roundCents':
      if (first) return first.toDecimalPlaces(2, Decimal.ROUND_HALF_UP);
      break;
    case 'roundCentsEven':
      if (first) return first.toDecimalPlaces(2, Decimal.ROUND_HALF_EVEN);
      break;
    case 'roundWhole':
      if (first) return first.toDecimalPlaces(0, Decimal.ROUND_HALF_UP);
      break;
    case 'roundTo':
      if (first && list[1]?.isInteger()) return first.toDecimalPlaces(list[1].toNumber(), Decimal.ROUND_HALF_UP);
      break;
    case 'npv':
      if (first) return presentValue(first, list.slice(1));
      break;
    case 'payback':
      return found(name, first ? paybackYears(first, list.slice(1)) : null);
    case 'irr':
      return found(name, rateOfReturn(list));
    case 'pow':
      if (first && list[1]?.isInteger()) return first.pow(list[1]);
      break;
  }
  throw new Error(`the function ${name} is not known or lacks its argument`);
}

function found(name: string, value: Exact | null): Exact {
  if (value === null) throw new Error(`the function ${name} has no value for its arguments`);
  return value;
}

function tokenize(formula: string): string[] {
  const tokens = formula.match(/\d+(?:\.\d+)?|[A-Za-z][A-Za-z0-9]*|[-+*/(),]|\S/g) ?? [];
  const strange = tokens.find((token) => !/^(\d+(\.\d+)?|[A-Za-z][A-Za-z0-9]*|[-+*/(),])$/.test(token));
  if (strange !== undefined) throw new Error(`the working “${formula}” holds “${strange}”`);
  return tokens;
}
