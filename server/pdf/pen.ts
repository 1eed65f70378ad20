import type { Face } from './fonts.ts';

/** `ink` for what is said, `soft` for what stands beside it, `rule` for lines. */
export type Ink = 'ink' | 'soft' | 'rule' | 'warn';
export type TextStyle = { face: Face; size: number; ink: Ink };

/** US Letter in points. */
export const PAGE = { width: 612, height: 792 } as const;

/** What a page is drawn with: text on a baseline and straight rules, from the top left corner, in points. */
export type Pen = {
  /** How wide a text is in one line. */
  width(text: string, style: TextStyle): number;
  /** One line of text; `x` is its left end, `baseline` the line it stands on. */
  text(x: number, baseline: number, text: string, style: TextStyle): void;
  rule(x: number, y: number, length: number, weight: number, ink: Ink): void;
  newPage(): void;
  /** Goes back to a page, counted from 1, to add to it. */
  turnTo(page: number): void;
  pages(): number;
};

/** What was drawn, in order, with the page it stands on: what a test reads instead of the coded file. */
export type Drawn =
  | { kind: 'text'; page: number; x: number; y: number; text: string; style: TextStyle }
  | { kind: 'rule'; page: number; x: number; y: number; length: number; weight: number; ink: Ink };

/** The same pen, with a record of all it drew. */
export function recorded(pen: Pen): { pen: Pen; drawn: Drawn[] } {
  const drawn: Drawn[] = [];
  let page = pen.pages();
  return {
    drawn,
    pen: {
      ...pen,
      text(x, baseline, text, style) {
        drawn.push({ kind: 'text', page, x, y: baseline, text, style });
        pen.text(x, baseline, text, style);
      },
      rule(x, y, length, weight, ink) {
        drawn.push({ kind: 'rule', page, x, y, length, weight, ink });
        pen.rule(x, y, length, weight, ink);
      },
      newPage() {
        pen.newPage();
        page = pen.pages();
      },
      turnTo(to) {
        page = to;
        pen.turnTo(to);
      },
    },
  };
}
