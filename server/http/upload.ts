import type { RequestHandler } from 'express';
import multer from 'multer';
import { fail, type Result, succeed } from '#shared/problem.ts';

export const UPLOAD_LIMIT_BYTES = 20 * 1024 * 1024;

/** One file in memory, a few short fields. multer has no limits of its own. */
export const receiveUpload: RequestHandler = multer({
  storage: multer.memoryStorage(),
  defParamCharset: 'utf8',
  limits: {
    fileSize: UPLOAD_LIMIT_BYTES,
    files: 1,
    fields: 4,
    parts: 6,
    fieldSize: 1024,
    fieldNameSize: 64,
    headerPairs: 40,
  },
}).single('file');

export type UploadedFile = { fileName: string; bytes: Uint8Array };

const MAX_NAME = 120;

/** Control characters, bidirectional marks and what file systems or headers give a meaning. */
// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is taken out
const UNSAFE = /[\u0000-\u001f\u007f-\u009f\u200e\u200f\u202a-\u202e\u2066-\u2069"<>:|?*\\/]/g;

/** The name a file is kept under: its last part only, without what could mislead a reader, a path or a header. */
export function safeFileName(name: string): string {
  const last = name.split(/[\\/]/).at(-1) ?? '';
  const clean = last.replace(UNSAFE, '').replace(/^\.+/, '').trim();
  if (clean === '') return 'file';
  if (clean.length <= MAX_NAME) return clean;
  const dot = clean.lastIndexOf('.');
  const ending = dot > 0 && clean.length - dot <= 8 ? clean.slice(dot) : '';
  return clean.slice(0, MAX_NAME - ending.length) + ending;
}

/** The file of a multipart request, its name made safe; `file-missing` or `file-empty` otherwise. */
export function uploadedFile(file: Express.Multer.File | undefined): Result<UploadedFile> {
  if (file === undefined) return fail('file-missing', 'Choose a file to upload.');
  const fileName = safeFileName(file.originalname);
  if (file.size === 0) return fail('file-empty', `${fileName} is empty. Choose the file again, or export it anew.`);
  return succeed({ fileName, bytes: file.buffer });
}
