import { fail, type Result, succeed } from '#shared/problem.ts';

/** What a file of each ending must begin with; no entry for plain text. */
const MAGIC: Record<string, readonly number[][]> = {
  pdf: [[0x25, 0x50, 0x44, 0x46, 0x2d]],
  png: [[0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]],
  jpg: [[0xff, 0xd8, 0xff]],
  jpeg: [[0xff, 0xd8, 0xff]],
};
const TEXT_ENDINGS = new Set(['csv', 'txt']);
const TYPES: Record<string, string> = {
  pdf: 'application/pdf',
  png: 'image/png',
  jpg: 'image/jpeg',
  jpeg: 'image/jpeg',
  csv: 'text/csv; charset=utf-8',
  txt: 'text/plain; charset=utf-8',
};

function endingOf(fileName: string): string {
  return /\.([a-z0-9]+)$/i.exec(fileName)?.[1]?.toLowerCase() ?? '';
}

/** The type a stored file is sent with; unknown endings are plain bytes. */
export function contentTypeOf(fileName: string): string {
  return TYPES[endingOf(fileName)] ?? 'application/octet-stream';
}

/** Whether a paper is one of the kinds kept here and its content is what its ending says. */
export function acceptPaper(fileName: string, bytes: Uint8Array): Result<null> {
  const ending = endingOf(fileName);
  if (TEXT_ENDINGS.has(ending)) {
    if (!bytes.includes(0)) return succeed(null);
    return fail('file-wrong-kind', `${fileName} is not plain text. Save it as PDF, or as CSV from its spreadsheet.`);
  }
  const starts = MAGIC[ending];
  if (starts === undefined) {
    return fail('file-wrong-kind', `${fileName} is of a kind that is not kept here. Use PDF, PNG, JPEG, CSV or text.`);
  }
  if (starts.some((start) => start.every((byte, index) => bytes[index] === byte))) return succeed(null);
  return fail('file-wrong-kind', `${fileName} says it is ${ending.toUpperCase()}, and its content is something else.`);
}
