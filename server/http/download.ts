import type { Response } from 'express';
import { DOWNLOAD_POLICY } from './security-headers.ts';
import { safeFileName } from './upload.ts';

/** A file to send; text goes as UTF-8. */
export type Download = { fileName: string; contentType: string; body: Uint8Array | string };

/** Sends a file to be saved, never shown: attachment, no guessing at its type, and a policy that lets it do nothing. */
export function sendDownload(res: Response, download: Download): void {
  const name = safeFileName(download.fileName);
  const ascii = name.replaceAll(/[^\x20-\x7e]/g, '_').replaceAll(/["\\%]/g, '_');
  const encoded = encodeURIComponent(name).replaceAll(
    /['()*]/g,
    (letter) => `%${letter.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  res.set({
    'Content-Type': download.contentType,
    'Content-Disposition': `attachment; filename="${ascii}"; filename*=UTF-8''${encoded}`,
    'Content-Security-Policy': DOWNLOAD_POLICY,
    'X-Content-Type-Options': 'nosniff',
  });
  res.send(typeof download.body === 'string' ? download.body : Buffer.from(download.body));
}
