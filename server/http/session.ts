import connectPgSimple from 'connect-pg-simple';
import type { Request, RequestHandler } from 'express';
import session from 'express-session';
import passport from 'passport';
import { Strategy } from 'passport-local';
import type pg from 'pg';
import type { Actor } from '#server/actor.ts';

export interface SessionParts {
  readonly pool: pg.Pool;
  readonly secret: string;
  readonly secure: boolean;
  /** The active person of this id, with the roles of now. */
  readonly findActor: (id: string) => Promise<Actor | undefined>;
  readonly checkCredentials: (email: string, password: string) => Promise<Actor | undefined>;
}

const idleHours = 12;

/** Sessions in the database and the person behind the cookie, read anew at each request. */
export function sessions(parts: SessionParts): { handlers: RequestHandler[]; close: () => void } {
  const Store = connectPgSimple(session);
  const store = new Store({ pool: parts.pool, tableName: 'sessions', pruneSessionInterval: 3600 });
  const auth = new passport.Passport();
  auth.use(
    new Strategy({ usernameField: 'email', passwordField: 'password' }, (email, password, done) => {
      parts.checkCredentials(email, password).then(
        (actor) => done(null, actor ?? false),
        (error: unknown) => done(error),
      );
    }),
  );
  auth.serializeUser((user, done) => done(null, user.id));
  auth.deserializeUser((id: string, done) => {
    parts.findActor(id).then(
      (actor) => done(null, actor ?? false),
      (error: unknown) => done(error),
    );
  });
  const cookies = session({
    name: 'fringeward',
    secret: parts.secret,
    store,
    resave: false,
    saveUninitialized: false,
    rolling: true,
    cookie: { httpOnly: true, sameSite: 'lax', secure: parts.secure, maxAge: idleHours * 3600_000 },
  });
  const authenticate: RequestHandler = (req, res, next) => {
    req.checkCredentials = () =>
      new Promise((resolve, reject) => {
        (
          auth.authenticate('local', (error: unknown, user: Actor | false) => {
            if (error) reject(error instanceof Error ? error : new Error('sign-in broke'));
            else resolve(user || undefined);
          }) as RequestHandler
        )(req, res, next);
      });
    next();
  };
  return {
    handlers: [cookies, auth.initialize() as RequestHandler, auth.session() as RequestHandler, authenticate],
    close: () => void store.close(),
  };
}

/** Begins a new session for a person; the session's id changes (no fixation). */
export function beginSession(req: Request, actor: Actor): Promise<void> {
  return new Promise((resolve, reject) =>
    req.logIn(actor, (error) => (error ? reject(error as Error) : resolve())),
  );
}

export function endSession(req: Request): Promise<void> {
  return new Promise((resolve, reject) =>
    req.logOut((error) =>
      error
        ? reject(error as Error)
        : req.session.destroy((fault) => (fault ? reject(fault as Error) : resolve())),
    ),
  );
}
