/** The lines of Form 5695 Part I that a solar roof uses, by the ledger's own names. */
export type CreditLineName = 'line1' | 'line6a' | 'line6b' | 'line12' | 'line13' | 'line14' | 'line15' | 'line16';

/** `form`: read on the form or its e-file stylesheet. `memory`: from memory. `notSeen`: the year's layout has not been seen. */
export type Verified = 'form' | 'memory' | 'notSeen';

export type CreditForm = {
  taxYear: number;
  /** What the year's form calls each line. */
  lines: Record<CreditLineName, string>;
  verified: Record<CreditLineName, Verified>;
  /** Line of Schedule 3 (Form 1040) that line 15 goes to; null where it is not known. */
  schedule3: string | null;
  schedule3Verified: Verified;
  /** What to check before relying on it; null when every number was read on the form. */
  note: string | null;
};

const NUMBERS: CreditForm['lines'] = {
  line1: '1',
  line6a: '6a',
  line6b: '6b',
  line12: '12',
  line13: '13',
  line14: '14',
  line15: '15',
  line16: '16',
};

const NAMES = Object.keys(NUMBERS) as CreditLineName[];

/**
 * Numbers by tax year. 2022: lines 1–12 and 16 read on the form, 13 on a June draft, 14 and 15 and Schedule 3 from memory. 2023: IRS e-file
 * stylesheet and a copy of the form. 2024: line 16 as the 2025 form names it, the others from memory. 2025: IRS stylesheet.
 */
const KNOWN: readonly { taxYear: number; fromMemory: readonly CreditLineName[]; schedule3: string; read: boolean }[] = [
  { taxYear: 2022, fromMemory: ['line14', 'line15'], schedule3: '5', read: false },
  { taxYear: 2023, fromMemory: [], schedule3: '5a', read: true },
  { taxYear: 2024, fromMemory: NAMES.filter((name) => name !== 'line16'), schedule3: '5a', read: false },
  { taxYear: 2025, fromMemory: [], schedule3: '5a', read: true },
];

/** The year's line numbers with how far each is known; a year not seen shows the numbers of 2025 and says so. */
export function creditFormOf(taxYear: number): CreditForm {
  const known = KNOWN.find((one) => one.taxYear === taxYear);
  if (!known) {
    return {
      taxYear,
      lines: NUMBERS,
      verified: verifiedBy(() => 'notSeen'),
      schedule3: null,
      schedule3Verified: 'notSeen',
      note: `The layout of the ${taxYear} form is not verified; the numbers are those of 2025.`,
    };
  }
  const memory = known.fromMemory.map((name) => NUMBERS[name]);
  const doubts = [
    ...(memory.length > 0 ? [`line ${memory.join(', ')}`] : []),
    ...(known.read ? [] : [`Schedule 3 line ${known.schedule3}`]),
  ];
  return {
    taxYear,
    lines: NUMBERS,
    verified: verifiedBy((name) => (known.fromMemory.includes(name) ? 'memory' : 'form')),
    schedule3: known.schedule3,
    schedule3Verified: known.read ? 'form' : 'memory',
    note: doubts.length === 0 ? null : `From memory, check on the form: ${doubts.join(' and ')}.`,
  };
}

function verifiedBy(of: (name: CreditLineName) => Verified): CreditForm['verified'] {
  return {
    line1: of('line1'),
    line6a: of('line6a'),
    line6b: of('line6b'),
    line12: of('line12'),
    line13: of('line13'),
    line14: of('line14'),
    line15: of('line15'),
    line16: of('line16'),
  };
}
