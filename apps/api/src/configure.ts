import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { NestExpressApplication } from '@nestjs/platform-express';
import cookieParser from 'cookie-parser';
import express, { type NextFunction, type Request, type Response } from 'express';
import helmet from 'helmet';
import { ProblemFilter } from './common/problem.filter.js';
import { validationPipe } from './common/validation.js';
import { serveDocs } from './docs.js';

/** Bodies larger than this are refused; the largest documents are geometry files and measured spectra. */
const BODY_LIMIT = '20mb';

/** Everything between the socket and the controllers, the same for the server and its tests. */
export function configure(app: NestExpressApplication): void {
  app.use(
    helmet({
      strictTransportSecurity: false,
      contentSecurityPolicy: {
        directives: {
          defaultSrc: ["'self'"],
          scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
          // Mantine writes style elements at run time.
          styleSrc: ["'self'", "'unsafe-inline'"],
          imgSrc: ["'self'", 'data:', 'blob:'],
          workerSrc: ["'self'", 'blob:'],
          upgradeInsecureRequests: null,
        },
      },
    }),
  );
  app.useBodyParser('json', { limit: BODY_LIMIT });
  app.use(cookieParser());
  app.setGlobalPrefix('api');
  app.useGlobalPipes(validationPipe());
  app.useGlobalFilters(new ProblemFilter());
  app.enableShutdownHooks();
  serveDocs(app);
  serveClient(app);
}

/** The built client: hashed files forever, its page for every address that is no file and no API. */
function serveClient(app: NestExpressApplication): void {
  const folder = fileURLToPath(new URL('../../web/dist', import.meta.url));
  if (!existsSync(folder)) return;
  app.use('/assets', express.static(`${folder}/assets`, { immutable: true, maxAge: '1y', fallthrough: false }));
  app.use(express.static(folder, { index: false, maxAge: 0 }));
  app.use((request: Request, response: Response, next: NextFunction) => {
    const page = ['GET', 'HEAD'].includes(request.method) && !request.path.startsWith('/api');
    if (page)
      response.sendFile(`${folder}/index.html`, { cacheControl: false, headers: { 'cache-control': 'no-cache' } });
    else next();
  });
}
