import { type Ink, PAGE, type Pen, type TextStyle } from './pen.ts';
import { wrapText } from './wrap.ts';

const MARGIN = 48;
const TOP = 74;
const BOTTOM = PAGE.height - 62;
const LEADING = 1.32;

export const STYLES = {
  title: { face: 'strong', size: 17, ink: 'ink' },
  heading: { face: 'strong', size: 11.5, ink: 'ink' },
  body: { face: 'text', size: 9.5, ink: 'ink' },
  strong: { face: 'strong', size: 9.5, ink: 'ink' },
  small: { face: 'text', size: 8.3, ink: 'soft' },
  margin: { face: 'text', size: 8, ink: 'soft' },
} as const satisfies Record<string, TextStyle>;

/** What stands over and under every page. */
export type PageFrame = { head: string; headRight: string; foot: string };

/** Sets text and rules one under another, and goes on to a new page where they do not fit. */
export type Flow = {
  pen: Pen;
  left: number;
  width: number;
  /** Where the next thing goes, from the top of the page. */
  y(): number;
  /** Moves down. */
  gap(points: number): void;
  /** Goes on to a new page unless so much still fits; true where it did. */
  need(points: number): boolean;
  newPage(): void;
  paragraph(text: string, style?: TextStyle): void;
  heading(text: string): void;
  lineHeight(style: TextStyle): number;
  /** Writes the frame on every page, "page 1 of 2" at its foot. Nothing is added after it. */
  finish(frame: PageFrame): void;
};

/** A flow over the page the pen is on. */
export function flowOn(pen: Pen): Flow {
  let y = TOP;
  const width = PAGE.width - 2 * MARGIN;
  const lineHeight = (style: TextStyle) => style.size * LEADING;
  const newPage = () => {
    pen.newPage();
    y = TOP;
  };
  const need = (points: number): boolean => {
    if (y + points <= BOTTOM) return false;
    newPage();
    return true;
  };
  const paragraph = (text: string, style: TextStyle = STYLES.body) => {
    for (const line of wrapText(text, width, (part) => pen.width(part, style))) {
      need(lineHeight(style));
      pen.text(MARGIN, y + style.size, line, style);
      y += lineHeight(style);
    }
  };
  return {
    pen,
    left: MARGIN,
    width,
    y: () => y,
    gap: (points) => {
      y += points;
    },
    need,
    newPage,
    paragraph,
    heading(text) {
      // A heading never stands alone at the foot of a page.
      need(lineHeight(STYLES.heading) + 40);
      paragraph(text, STYLES.heading);
      y += 3;
    },
    lineHeight,
    finish(frame) {
      const pages = pen.pages();
      for (let page = 1; page <= pages; page += 1) {
        pen.turnTo(page);
        drawFrame(pen, frame, `page ${page} of ${pages}`);
      }
    },
  };
}

function drawFrame(pen: Pen, { head, headRight, foot }: PageFrame, number: string): void {
  const right = PAGE.width - MARGIN;
  const ink: Ink = 'rule';
  const style = STYLES.margin;
  pen.text(MARGIN, 46, head, style);
  pen.text(right - pen.width(headRight, style), 46, headRight, style);
  pen.rule(MARGIN, 53, right - MARGIN, 0.6, ink);
  pen.rule(MARGIN, PAGE.height - 50, right - MARGIN, 0.6, ink);
  pen.text(MARGIN, PAGE.height - 37, foot, style);
  pen.text(right - pen.width(number, style), PAGE.height - 37, number, style);
}
