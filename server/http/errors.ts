import type { ErrorRequestHandler, Request } from 'express';
import multer from 'multer';
import { type Problem, problem } from '#shared/problem.ts';
import type { Log } from '../log.ts';
import { sendProblem } from './problems.ts';

function statusOf(error: unknown): number | null {
  if (typeof error !== 'object' || error === null || !('status' in error)) return null;
  return typeof error.status === 'number' ? error.status : null;
}

/** A fault of the request that a library reported; null for a bug of ours. */
function requestProblem(error: unknown, req: Request): Problem | null {
  if (error instanceof multer.MulterError) {
    if (error.code === 'LIMIT_FILE_SIZE') {
      return problem('file-too-large', 'The file is larger than 20 MB. Export a shorter time, one year for instance.');
    }
    return problem('bad-request', 'Send one file at a time, in the field `file`.');
  }
  const status = statusOf(error);
  if (status === 413) return problem('bad-request', 'The request is too large.');
  if (status !== null && status >= 400 && status < 500) return problem('bad-request', 'The request could not be read.');
  if (error instanceof Error && req.is('multipart/form-data') && /multipart|boundary|form/i.test(error.message)) {
    return problem('bad-request', 'The upload broke off or is not well formed. Send it again.');
  }
  return null;
}

/** The last handler: a request's fault as its problem, anything else as `server-error` without a word about the inside. */
export function errorHandler(log: Log): ErrorRequestHandler {
  return (error, req, res, next) => {
    if (res.headersSent) return next(error);
    const known = requestProblem(error, req);
    if (known !== null) return sendProblem(res, known);
    log('error', 'failed', {
      id: String(res.locals.requestId ?? ''),
      method: req.method,
      path: req.path,
      error: error instanceof Error ? (error.stack ?? error.message) : String(error),
    });
    sendProblem(res, problem('server-error', 'Something went wrong on our side. Nothing was changed; try again.'));
  };
}
