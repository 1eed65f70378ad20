import path from 'node:path';
import express, { Router } from 'express';

/** What an address of the application can be; dots, escapes and the like never belong to one. */
const APP_PATH = /^\/[\w\-/]*$/;

/**
 * The built client: assets under their hashed names for ever, the page itself fresh each time, and the page for every address that the
 * client's router knows.
 */
export function clientFiles(distDir: string): Router {
  const router = Router();
  const page = path.join(distDir, 'index.html');
  router.use(
    '/assets',
    express.static(path.join(distDir, 'assets'), {
      immutable: true,
      maxAge: '365d',
      index: false,
      dotfiles: 'ignore',
      redirect: false,
    }),
  );
  router.use(express.static(distDir, { index: false, dotfiles: 'ignore', redirect: false, maxAge: 0 }));
  router.get('/{*path}', (req, res, next) => {
    if (!APP_PATH.test(req.path)) return next();
    res.set('Cache-Control', 'no-cache');
    res.sendFile(page, { dotfiles: 'allow' });
  });
  return router;
}
