// Makes the mutants of a source file: each one small change that a test should notice. Words, ids and formulas (text) are left alone.
import { parseSync } from 'vite';

const COMPARISONS = {
  '<': ['<=', '>='],
  '<=': ['<', '>'],
  '>': ['>=', '<='],
  '>=': ['>', '<'],
  '===': ['!=='],
  '!==': ['==='],
};
const ARITHMETIC = { '+': '-', '-': '+', '*': '/', '/': '*', '%': '*' };
const ASSIGNMENTS = { '+=': '-=', '-=': '+=' };
const UPDATES = { '++': '--', '--': '++' };
/** Calls whose opposite has the same shape; the last four are this project's own arithmetic. */
const CALLS = {
  min: 'max',
  max: 'min',
  some: 'every',
  every: 'some',
  plus: 'minus',
  minus: 'plus',
  lesser: 'greater',
  greater: 'lesser',
};

/** `{ start, end, text, what }` for each mutant of a source; `start` and `end` are places in it. */
export function mutantsOf(fileName, source) {
  const { program, errors } = parseSync(fileName, source);
  if (errors.length > 0) throw new Error(`${fileName} cannot be read`);
  const made = [];
  const cut = (node) => source.slice(node.start, node.end);
  const add = (start, end, text) =>
    made.push({ start, end, text, what: `${short(source.slice(start, end))} → ${short(text)}` });
  const operator = (node, to) => {
    const from = source.indexOf(node.operator, node.left.end);
    made.push({
      start: from,
      end: from + node.operator.length,
      text: to,
      what: `${short(cut(node))}: ${node.operator} → ${to}`,
    });
  };
  const visit = (node) => {
    if (typeof node?.type !== 'string' || isType(node)) return;
    const rules = RULES[node.type];
    rules?.(node, { add, cut, operator });
    for (const value of Object.values(node)) {
      if (Array.isArray(value)) for (const inner of value) visit(inner);
      else if (typeof value === 'object' && value !== null) visit(value);
    }
  };
  visit(program);
  return made;
}

/** Types are gone when the program runs; only what stands inside `as` and `satisfies` does anything. */
function isType({ type }) {
  if (type === 'ImportDeclaration' || type === 'ExportAllDeclaration') return true;
  return type.startsWith('TS') && type !== 'TSAsExpression' && type !== 'TSSatisfiesExpression';
}

const RULES = {
  BinaryExpression(node, { operator }) {
    for (const to of COMPARISONS[node.operator] ?? []) operator(node, to);
    const swapped = ARITHMETIC[node.operator];
    if (swapped && !isText(node.left) && !isText(node.right)) operator(node, swapped);
  },
  LogicalExpression(node, { add, cut, operator }) {
    if (node.operator === '&&') operator(node, '||');
    else if (node.operator === '||') operator(node, '&&');
    else add(node.start, node.end, `(${cut(node.left)})`);
  },
  AssignmentExpression(node, { operator }) {
    const swapped = ASSIGNMENTS[node.operator];
    if (swapped && !isText(node.right)) operator(node, swapped);
  },
  UpdateExpression(node, { add, cut }) {
    add(node.start, node.end, cut(node).replace(node.operator, UPDATES[node.operator]));
  },
  UnaryExpression(node, { add, cut }) {
    if (node.operator === '!' || node.operator === '-') add(node.start, node.end, `(${cut(node.argument)})`);
  },
  ConditionalExpression(node, { add }) {
    if (isSameText(node)) return;
    add(node.test.start, node.test.end, 'true');
    add(node.test.start, node.test.end, 'false');
  },
  IfStatement(node, { add, cut }) {
    add(node.test.start, node.test.end, `!(${cut(node.test)})`);
    // Without its consequence: an early exit that is left out, a step that is not taken.
    add(node.test.start, node.test.end, 'false');
  },
  Literal(node, { add }) {
    if (typeof node.value === 'number') {
      add(node.start, node.end, String(node.value + 1));
      if (node.value > 0) add(node.start, node.end, String(node.value - 1));
    } else if (typeof node.value === 'boolean') add(node.start, node.end, String(!node.value));
  },
  CallExpression(node, { add }) {
    const name = node.callee.type === 'MemberExpression' ? node.callee.property : node.callee;
    if (name.type === 'Identifier' && Object.hasOwn(CALLS, name.name)) add(name.start, name.end, CALLS[name.name]);
  },
  ExpressionStatement(node, { add }) {
    if (node.expression.type !== 'Literal') add(node.start, node.end, ';');
  },
};

function isText(node) {
  return node.type === 'TemplateLiteral' || (node.type === 'Literal' && typeof node.value === 'string');
}

/** `cond ? 'a word' : 'another'`: words, not arithmetic. */
function isSameText(node) {
  return isText(node.consequent) && isText(node.alternate);
}

function short(text) {
  const line = text.replace(/\s+/g, ' ');
  return line.length > 60 ? `${line.slice(0, 57)}…` : line;
}
