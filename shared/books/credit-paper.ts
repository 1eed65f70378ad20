/** What a paper behind the credit is. The kind is a part of its name, before the comma, where the owner gave one: "final inspection, scan0001.pdf". */
export const CREDIT_PAPER_KINDS = [
  { kind: 'contract', words: 'Contract', in: 'contract', also: /\b(contract|agreement)\b/ },
  { kind: 'invoice', words: 'Final invoice', in: 'invoice', also: /\binvoice\b/ },
  { kind: 'payment', words: 'Proof of payment', in: 'proof of payment', also: /\b(payments?|paid|receipt)\b/ },
  { kind: 'inspection', words: 'Final inspection', in: 'final inspection', also: /\binspection\b/ },
  {
    kind: 'permission',
    words: 'Permission to operate',
    in: 'permission to operate',
    also: /\b(permission|pto|interconnection)\b/,
  },
  { kind: 'rebate', words: 'Rebate or subsidy letter', in: 'rebate letter', also: /\b(rebate|subsidy)\b/ },
  { kind: 'return', words: 'Form 5695 and worksheet', in: 'return', also: /\b(5695|1040|return|worksheet)\b/ },
  { kind: 'other', words: 'Another paper', in: 'paper', also: /^$/ },
] as const;

export type CreditPaperKind = (typeof CREDIT_PAPER_KINDS)[number]['kind'];

/** The kind in front of a name, and the name as the file came. */
function split(fileName: string): { kind: CreditPaperKind | null; rest: string } {
  const known = CREDIT_PAPER_KINDS.find((one) => fileName.startsWith(`${one.in}, `));
  return known ? { kind: known.kind, rest: fileName.slice(known.in.length + 2) } : { kind: null, rest: fileName };
}

/** What a paper is: as its owner said, else as its name says, else `other`. */
export function creditPaperKind(fileName: string): CreditPaperKind {
  const { kind, rest } = split(fileName);
  if (kind !== null) return kind;
  const words = rest.toLowerCase().replaceAll(/[_\-.]+/g, ' ');
  return CREDIT_PAPER_KINDS.find((one) => one.also.test(words))?.kind ?? 'other';
}

/** The paper's name with its kind in front, in the place of one it had; as it is where it says the kind by itself. */
export function namedAs(fileName: string, kind: CreditPaperKind): string {
  const { rest } = split(fileName);
  if (creditPaperKind(rest) === kind) return rest;
  return CREDIT_PAPER_KINDS.filter((one) => one.kind === kind).reduce((name, one) => `${one.in}, ${name}`, rest);
}
