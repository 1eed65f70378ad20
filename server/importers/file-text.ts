import { fail, type Result, succeed } from '#shared/problem.ts';
import type { FileInput } from './contract.ts';

export type FileText = { text: string; encoding: 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252' };

const starts = (bytes: Uint8Array, ...magic: number[]) => magic.every((byte, index) => bytes[index] === byte);

/** What a file that is no text looks like at its first bytes, and what to do about it. */
function foreignKind(bytes: Uint8Array): string | null {
  if (starts(bytes, 0x50, 0x4b, 0x03, 0x04) || starts(bytes, 0x50, 0x4b, 0x05, 0x06)) {
    return 'This is a spreadsheet or zip file. Save the sheet as CSV and upload that.';
  }
  if (starts(bytes, 0xd0, 0xcf, 0x11, 0xe0))
    return 'This is an older spreadsheet file. Save the sheet as CSV and upload that.';
  if (starts(bytes, 0x25, 0x50, 0x44, 0x46)) return 'This is a PDF, not a CSV file.';
  if (starts(bytes, 0x1f, 0x8b)) return 'This file is compressed. Unpack it and upload the CSV inside.';
  if (starts(bytes, 0x89, 0x50, 0x4e, 0x47) || starts(bytes, 0xff, 0xd8, 0xff))
    return 'This is a picture, not a CSV file.';
  return null;
}

/** A UTF-16 file without a mark: nearly every second byte of its first stretch is zero. */
function unmarkedUtf16(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | null {
  const size = Math.min(bytes.length, 512) & ~1;
  if (size < 16) return null;
  let even = 0;
  let odd = 0;
  for (let at = 0; at < size; at += 2) {
    if (bytes[at] === 0) even += 1;
    if (bytes[at + 1] === 0) odd += 1;
  }
  const pairs = size / 2;
  if (odd > pairs * 0.8 && even === 0) return 'utf-16le';
  if (even > pairs * 0.8 && odd === 0) return 'utf-16be';
  return null;
}

function decode(bytes: Uint8Array): FileText {
  if (starts(bytes, 0xff, 0xfe)) return { text: new TextDecoder('utf-16le').decode(bytes), encoding: 'utf-16le' };
  if (starts(bytes, 0xfe, 0xff)) return { text: new TextDecoder('utf-16be').decode(bytes), encoding: 'utf-16be' };
  const wide = unmarkedUtf16(bytes);
  if (wide) return { text: new TextDecoder(wide).decode(bytes), encoding: wide };
  try {
    return { text: new TextDecoder('utf-8', { fatal: true }).decode(bytes), encoding: 'utf-8' };
  } catch {
    return { text: new TextDecoder('windows-1252').decode(bytes), encoding: 'windows-1252' };
  }
}

/**
 * The text of an uploaded file, without its byte order mark: UTF-8 or UTF-16 by mark, else strict UTF-8, else windows-1252.
 * Refuses empty files (`file-empty`), files over `maxBytes` (`file-too-large`) and what is no text (`file-wrong-kind`).
 */
export function readFileText(file: FileInput, maxBytes: number): Result<FileText> {
  const { bytes } = file;
  if (bytes.length === 0) return fail('file-empty', 'The file is empty.');
  if (bytes.length > maxBytes) {
    return fail('file-too-large', `The file is larger than ${Math.floor(maxBytes / 1_000_000)} MB.`);
  }
  const foreign = foreignKind(bytes);
  if (foreign) return fail('file-wrong-kind', foreign);
  const decoded = decode(bytes);
  if (decoded.text.trim() === '') return fail('file-empty', 'The file holds no text.');
  if (decoded.text.includes('\0')) return fail('file-wrong-kind', 'This is not a text file. Upload a CSV file.');
  if (/^\s*</.test(decoded.text)) return fail('file-wrong-kind', 'This is a web page or XML file, not a CSV file.');
  return succeed(decoded);
}
