const PLAIN_NUMBER = /^-?\d+(\.\d+)?$/;
/** What a spreadsheet would take for the start of a formula (OWASP, "CSV Injection"). */
const FORMULA_START = /^[=+\-@\t\r]/;

/**
 * Rows as CSV (RFC 4180: CRLF, quotes doubled) that a spreadsheet opens without running anything: a text that would start a formula gets an
 * apostrophe in front. Plain numbers stay numbers, negative ones too.
 */
export function toCsv(rows: readonly (readonly string[])[]): string {
  return rows
    .map((row) => row.map(csvCell).join(','))
    .join('\r\n')
    .concat('\r\n');
}

function csvCell(text: string): string {
  const safe = FORMULA_START.test(text) && !PLAIN_NUMBER.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** Hands a text to the browser as a file to save. */
export function saveText(fileName: string, text: string, type: string): void {
  const url = URL.createObjectURL(new Blob([text], { type }));
  const link = document.createElement('a');
  link.href = url;
  link.download = fileName;
  link.click();
  URL.revokeObjectURL(url);
}
