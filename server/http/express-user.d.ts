import type { Actor } from '#server/actor.ts';

declare global {
  namespace Express {
    // Passport puts the signed-in person here.
    // eslint-disable-next-line @typescript-eslint/no-empty-object-type
    interface User extends Actor {}
    interface Request {
      /** The person whom e-mail and password of the body belong to, through passport; undefined when they are not right. */
      checkCredentials(): Promise<Actor | undefined>;
    }
  }
}
