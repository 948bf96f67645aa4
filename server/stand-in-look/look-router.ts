import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import { Router } from 'express';

const styleSheet = fileURLToPath(new URL('./look.css', import.meta.url));
const packages = createRequire(import.meta.url);
const fontFile = /^nunito-(latin|latin-ext)-(400|600|800)-normal\.woff2$/;

/** Serves the stand-ins' style sheet and typeface. */
export function lookRouter(): Router {
  const router = Router();
  router.get('/look.css', (_request, response) => response.sendFile(styleSheet));
  router.get('/:file', (request, response, next) => {
    if (!fontFile.test(request.params.file)) return next();
    const file = packages.resolve(`@fontsource/nunito/files/${request.params.file}`);
    response.set('cache-control', 'public, max-age=86400').sendFile(file, { dotfiles: 'allow' });
  });
  return router;
}
