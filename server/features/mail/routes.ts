import type { Deps } from '#server/deps.ts';
import { readOutbox } from '#server/features/mail/service.ts';
import { route, type Route } from '#server/http/route.ts';
import { listMail } from '#shared/contracts/mail.ts';

export function mailRoutes(deps: Deps): Route[] {
  return [route(listMail, ({ query }) => readOutbox(deps, query.page, query.pageSize))];
}
