import { inflateSync } from 'node:zlib';

type PdfObject = { head: string; stream: string | null };

/**
 * The text of each page of a PDF as this product writes them: each piece as it was set, in the order of drawing. Glyph numbers are turned back into letters by
 * the embedded fonts' own ToUnicode maps (ISO 32000-1, 9.10.3), so that what is read is what a reader's copy-and-paste gives.
 */
export function pdfTexts(file: Uint8Array): string[][] {
  const objects = objectsOf(Buffer.from(file).toString('latin1'));
  const fonts = new Map<string, Map<string, string>>();
  for (const { head } of objects.values()) {
    for (const [, name = '', font = ''] of head.matchAll(/\/(F\d+) (\d+) 0 R/g)) {
      const map = /\/ToUnicode (\d+) 0 R/.exec(objects.get(font)?.head ?? '')?.[1] ?? '';
      fonts.set(name, lettersOf(objects.get(map)?.stream ?? ''));
    }
  }
  const kids = /\/Type \/Pages[\s\S]*?\/Kids \[([^\]]*)\]/.exec(
    [...objects.values()].map(({ head }) => head).join('\n'),
  );
  const pages = [...(kids?.[1] ?? '').matchAll(/(\d+) 0 R/g)].map(([, id = '']) => objects.get(id)?.head ?? '');
  return pages.map((page) => {
    const contents = /\/Contents (\d+) 0 R/.exec(page)?.[1] ?? '';
    return textsOf(objects.get(contents)?.stream ?? '', fonts);
  });
}

function objectsOf(text: string): Map<string, PdfObject> {
  const objects = new Map<string, PdfObject>();
  for (const [, id = '', body = ''] of text.matchAll(/(?:^|\n)(\d+) 0 obj\n([\s\S]*?)\nendobj/g)) {
    const start = body.indexOf('stream\n');
    if (start < 0) {
      objects.set(id, { head: body, stream: null });
      continue;
    }
    const head = body.slice(0, start);
    const length = Number(/\/Length (\d+)/.exec(head)?.[1] ?? '0');
    const bytes = Buffer.from(body.slice(start + 7, start + 7 + length), 'latin1');
    const isText = head.includes('/FlateDecode') && !head.includes('/Length1');
    objects.set(id, { head, stream: isText ? inflateSync(bytes).toString('latin1') : null });
  }
  return objects;
}

/** Glyph number as four hex figures → letters. */
function lettersOf(cmap: string): Map<string, string> {
  const letters = new Map<string, string>();
  for (const [, from = '0', list = ''] of cmap.matchAll(/<([0-9a-f]{4})> <[0-9a-f]{4}> \[([^\]]*)\]/g)) {
    for (const [index, [, codes = '']] of [...list.matchAll(/<([^>]*)>/g)].entries()) {
      const glyph = (Number.parseInt(from, 16) + index).toString(16).padStart(4, '0');
      letters.set(glyph, String.fromCharCode(...codes.split(' ').map((code) => Number.parseInt(code, 16))));
    }
  }
  return letters;
}

function textsOf(contents: string, fonts: Map<string, Map<string, string>>): string[] {
  const texts: string[] = [];
  for (const [, font = '', shown = ''] of contents.matchAll(/\/(F\d+) [\d.]+ Tf\n\[([^\]]*)\] TJ/g)) {
    const glyphs = [...shown.matchAll(/<([0-9a-f]+)>/g)].flatMap(([, hex = '']) => hex.match(/.{4}/g) ?? []);
    texts.push(glyphs.map((glyph) => fonts.get(font)?.get(glyph) ?? '\ufffd').join(''));
  }
  return texts;
}
