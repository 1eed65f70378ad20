import PDFDocument from 'pdfkit';
import { ALPHABETS, FACES, fontFile } from './fonts.ts';
import { type Ink, PAGE, type Pen, type TextStyle } from './pen.ts';

const INKS: Record<Ink, string> = { ink: '#1d2933', soft: '#55606a', rule: '#b9bdb4', warn: '#8a2f2f' };
/** Figures that can stand under another are all of one width. */
const FEATURES: PDFKit.Mixins.OpenTypeFeatures[] = ['tnum', 'lnum', 'kern'];
/** Stands for a letter that no embedded font has. */
const NO_LETTER = '?';

export type PdfInfo = {
  title: string;
  /** The day the paper was made, `YYYY-MM-DD`: with the same content it gives the same file. */
  madeOn: string;
};

type Run = { font: string; text: string };
type Embedded = PDFKit.PDFDocument & { _font: { font: { hasGlyphForCodePoint(code: number): boolean } } };

/** A pen over a PDF file, and what ends it and gives its bytes. */
export function pdfPen({ title, madeOn }: PdfInfo): { pen: Pen; end: () => Promise<Buffer> } {
  const document = new PDFDocument({
    size: [PAGE.width, PAGE.height],
    margin: 0,
    bufferPages: true,
    lang: 'en-US',
    displayTitle: true,
    info: { Title: title, Creator: 'Gablebook', Producer: 'Gablebook', CreationDate: new Date(`${madeOn}T00:00:00Z`) },
  });
  for (const face of FACES) {
    for (const alphabet of ALPHABETS) document.registerFont(`${face} ${alphabet}`, fontFile(face, alphabet));
  }
  const chunks: Buffer[] = [];
  document.on('data', (chunk: Buffer) => chunks.push(chunk));

  const letters = new Map<string, string | null>();
  /** The first font of the face that has the letter; null where none has. */
  const fontOf = (letter: string, face: string): string | null => {
    const key = `${face} ${letter}`;
    const known = letters.get(key);
    if (known !== undefined) return known;
    const code = letter.codePointAt(0) ?? 0;
    const found = ALPHABETS.map((alphabet) => `${face} ${alphabet}`).find((font) => {
      document.font(font);
      return (document as Embedded)._font.font.hasGlyphForCodePoint(code);
    });
    letters.set(key, found ?? null);
    return found ?? null;
  };
  const runsOf = (text: string, { face }: TextStyle): Run[] => {
    const runs: Run[] = [];
    for (const letter of text) {
      const found = fontOf(letter, face);
      const font = found ?? `${face} latin`;
      const shown = found === null ? NO_LETTER : letter;
      const last = runs.at(-1);
      if (last?.font === font) last.text += shown;
      else runs.push({ font, text: shown });
    }
    return runs;
  };
  const runWidth = (run: Run, size: number) =>
    document.font(run.font).fontSize(size).widthOfString(run.text, { features: FEATURES });

  const pen: Pen = {
    width: (text, style) => runsOf(text, style).reduce((sum, run) => sum + runWidth(run, style.size), 0),
    text(x, baseline, text, style) {
      let at = x;
      for (const run of runsOf(text, style)) {
        const width = runWidth(run, style.size);
        document
          .fillColor(INKS[style.ink])
          .text(run.text, at, baseline, { lineBreak: false, baseline: 'alphabetic', features: FEATURES });
        at += width;
      }
    },
    rule(x, y, length, weight, ink) {
      document
        .moveTo(x, y)
        .lineTo(x + length, y)
        .lineWidth(weight)
        .stroke(INKS[ink]);
    },
    newPage: () => {
      document.addPage();
    },
    turnTo: (page) => {
      document.switchToPage(page - 1);
    },
    pages: () => document.bufferedPageRange().count,
  };
  return {
    pen,
    end: () =>
      new Promise((resolve, reject) => {
        document.on('end', () => resolve(Buffer.concat(chunks)));
        document.on('error', reject);
        document.end();
      }),
  };
}
