import { type Flow, STYLES } from './flow.ts';
import type { TextStyle } from './pen.ts';
import { wrapText } from './wrap.ts';

export type Column = {
  /** Share of the flow's width. */
  share: number;
  align: 'left' | 'right';
};
/** `total` draws the double rule of an account under itself; `quiet` is what stands beside the figures. */
export type Row = { cells: readonly string[]; kind?: 'plain' | 'total' | 'quiet' };

const GAP = 8;
const PAD = 3.2;

/** A ruled table: a strong rule under the head, a thin one under each row, a double one under a total. The head stands again on a new page. */
export function table(
  flow: Flow,
  columns: readonly Column[],
  head: readonly string[] | null,
  rows: readonly Row[],
): void {
  const all = columns.reduce((sum, column) => sum + column.share, 0);
  const widths = columns.map((column) => (flow.width * column.share) / all);
  const linesOf = (cells: readonly string[], style: TextStyle): string[][] =>
    cells.map((cell, index) => wrapText(cell, (widths[index] ?? 0) - GAP, (part) => flow.pen.width(part, style)));
  const heightOf = (lines: string[][], style: TextStyle) =>
    Math.max(...lines.map((cell) => cell.length)) * flow.lineHeight(style) + 2 * PAD;
  const draw = (lines: string[][], style: TextStyle) => {
    const top = flow.y() + PAD;
    let x = flow.left;
    for (const [index, cell] of lines.entries()) {
      const width = widths[index] ?? 0;
      for (const [line, text] of cell.entries()) {
        const at = columns[index]?.align === 'right' ? x + width - flow.pen.width(text, style) : x;
        flow.pen.text(at, top + line * flow.lineHeight(style) + style.size, text, style);
      }
      x += width;
    }
    flow.gap(heightOf(lines, style));
  };
  const drawHead = () => {
    if (head === null) {
      flow.pen.rule(flow.left, flow.y(), flow.width, 1.1, 'ink');
      return;
    }
    draw(linesOf(head, STYLES.small), STYLES.small);
    flow.pen.rule(flow.left, flow.y(), flow.width, 1.1, 'ink');
  };
  flow.need(60);
  drawHead();
  for (const { cells, kind = 'plain' } of rows) {
    const style: TextStyle =
      kind === 'total' ? { ...STYLES.body, face: 'total' } : kind === 'quiet' ? STYLES.small : STYLES.body;
    const lines = linesOf(cells, style);
    if (flow.need(heightOf(lines, style))) drawHead();
    draw(lines, style);
    if (kind === 'total') {
      flow.pen.rule(flow.left, flow.y(), flow.width, 0.8, 'ink');
      flow.gap(2);
      flow.pen.rule(flow.left, flow.y(), flow.width, 0.8, 'ink');
    } else flow.pen.rule(flow.left, flow.y(), flow.width, 0.5, 'rule');
  }
}
