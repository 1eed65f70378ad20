import type { CreditView } from '#shared/api/credit.ts';

type FormYear = CreditView['forms'][number];

/** Part I as the forms of 2022 to 2025 number it; solar electric only. */
const LINES = {
  line1: '1',
  line6a: '6a',
  line6b: '6b',
  line12: '12',
  line13: '13',
  line14: '14',
  line15: '15',
  line16: '16',
};

/**
 * Line numbers of Form 5695 Part I and of Schedule 3 by tax year. From the IRS forms and e-file stylesheets of 2022, 2023 and 2025; what was not
 * seen on the form itself says so.
 */
const KNOWN: readonly FormYear[] = [
  {
    taxYear: 2022,
    lines: LINES,
    schedule3: '5',
    note: 'Lines 14 and 15 and the Schedule 3 line are from memory; check the form.',
  },
  { taxYear: 2023, lines: LINES, schedule3: '5a', note: null },
  {
    taxYear: 2024,
    lines: LINES,
    schedule3: '5a',
    note: 'Line numbers other than 16 are from memory; check the form.',
  },
  { taxYear: 2025, lines: LINES, schedule3: '5a', note: null },
];

/** The line numbers of a year; for a year whose form has not been seen, those of 2025 with a word of warning. */
export function formYearOf(taxYear: number): FormYear {
  return (
    KNOWN.find((known) => known.taxYear === taxYear) ?? {
      taxYear,
      lines: LINES,
      schedule3: null,
      note: `The form for ${taxYear} has not been checked; the numbers are those of 2025.`,
    }
  );
}
