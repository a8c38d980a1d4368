import { existsSync } from 'node:fs';
import { join } from 'node:path';
import express, { Router, type Express } from 'express';
import type pg from 'pg';
import pinoHttp from 'pino-http';
import type { Deps } from '#server/deps.ts';
import { auditRoutes } from '#server/features/audit/routes.ts';
import { benchRoutes } from '#server/features/benches/routes.ts';
import { caseRoutes } from '#server/features/cases/routes.ts';
import { exposureRoutes } from '#server/features/exposures/routes.ts';
import { identifyJob } from '#server/features/identifications/jobs.ts';
import { identificationRoutes } from '#server/features/identifications/routes.ts';
import { sendMailJob } from '#server/features/mail/jobs.ts';
import { mailRoutes } from '#server/features/mail/routes.ts';
import { matchRoutes } from '#server/features/matches/routes.ts';
import { peopleRoutes } from '#server/features/people/routes.ts';
import { checkCredentials, findActor } from '#server/features/people/service.ts';
import { referenceRoutes } from '#server/features/references/routes.ts';
import type { FirstAdministratorCode } from '#server/features/session/first-administrator.ts';
import { sessionRoutes } from '#server/features/session/routes.ts';
import { problemHandler } from '#server/http/problem.ts';
import { notFound } from '#server/http/refusal.ts';
import { mount, type Route } from '#server/http/route.ts';
import { sameSiteOnly, securityHeaders } from '#server/http/security.ts';
import { sessions } from '#server/http/session.ts';
import type { JobDefinition } from '#server/jobs/job-queue.ts';
import { allEndpoints } from '#shared/contracts/all-endpoints.ts';

export interface AppOptions {
  readonly pool: pg.Pool;
  readonly sessionSecret: string;
  readonly firstCode?: FirstAdministratorCode | undefined;
  /** Folder of the built pages; left out where only the API is served. */
  readonly pages?: string | undefined;
}

/** One line per feature. */
export function allRoutes(deps: Deps, firstCode?: FirstAdministratorCode): Route[] {
  return [
    ...sessionRoutes(deps, firstCode),
    ...peopleRoutes(deps),
    ...caseRoutes(deps),
    ...benchRoutes(deps),
    ...exposureRoutes(deps),
    ...identificationRoutes(deps),
    ...matchRoutes(deps),
    ...referenceRoutes(deps),
    ...mailRoutes(deps),
    ...auditRoutes(deps),
  ];
}

export function allJobs(deps: Deps): JobDefinition<never>[] {
  return [identifyJob(deps), sendMailJob(deps)];
}

/** The whole application over its dependencies. Refuses to be made while an endpoint has no handler, or two. */
export function createApp(
  deps: Deps,
  options: AppOptions,
  routesOf: typeof allRoutes = allRoutes,
): { app: Express; close: () => void } {
  const routes = routesOf(deps, options.firstCode);
  requireOneHandlerEach(routes);
  const secure = deps.settings.baseUrl.startsWith('https:');
  const app = express();
  app.disable('x-powered-by');
  if (secure) app.set('trust proxy', 1);
  app.use(securityHeaders(secure));
  app.use(
    pinoHttp({
      logger: deps.log,
      quietReqLogger: true,
      autoLogging: { ignore: (req) => !req.url?.startsWith('/api/') },
      customLogLevel: (_req, res, error) => ((error ?? res.statusCode >= 500) ? 'error' : 'debug'),
    }),
  );
  app.get('/healthz', (_req, res) => void res.json({ status: 'ok' }));

  const { handlers, close } = sessions({
    pool: options.pool,
    secret: options.sessionSecret,
    secure,
    findActor: (id) => findActor(deps.db, id),
    checkCredentials: (email, password) => checkCredentials(deps.db, email, password),
  });
  const api = Router();
  api.use(sameSiteOnly(deps.settings.baseUrl));
  api.use((_req, res, next) => {
    res.setHeader('Cache-Control', 'no-store');
    next();
  });
  api.use(express.json({ limit: '200kb' }));
  for (const handler of handlers) api.use(handler);
  mount(api, routes);
  app.use((req, res, next) => (req.path.startsWith('/api/') ? api(req, res, next) : next()));
  app.use('/api', () => {
    throw notFound('address in the API');
  });
  if (options.pages && existsSync(options.pages)) servePages(app, options.pages);
  app.use(problemHandler(deps.log));
  return { app, close };
}

function requireOneHandlerEach(routes: readonly Route[]): void {
  for (const endpoint of allEndpoints) {
    const n = routes.filter((r) => r.endpoint === endpoint).length;
    if (n !== 1) throw new Error(`the endpoint ${endpoint.name} has ${n} handlers`);
  }
  if (routes.length !== allEndpoints.length) throw new Error('a route binds an endpoint that is not listed');
}

/** Built files are immutable under their hashed names; every other address is the one page. */
function servePages(app: Express, folder: string): void {
  app.use(
    '/assets',
    express.static(join(folder, 'assets'), { immutable: true, maxAge: '1y', fallthrough: false }),
  );
  app.use(express.static(folder, { index: false, maxAge: 0 }));
  app.get('/{*path}', (_req, res) => {
    res.setHeader('Cache-Control', 'no-cache');
    res.sendFile(join(folder, 'index.html'));
  });
}
