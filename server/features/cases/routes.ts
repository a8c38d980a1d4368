import type { Deps } from '#server/deps.ts';
import { beginCase, changeCase, readCase, reopen, workList } from '#server/features/cases/service.ts';
import { route, type Route } from '#server/http/route.ts';
import { editCase, getCase, listCases, openCase, reopenCase } from '#shared/contracts/cases.ts';

export function caseRoutes(deps: Deps): Route[] {
  return [
    route(listCases, ({ actor, query }) => workList(deps, actor, query)),
    route(openCase, ({ actor, body }) => beginCase(deps, actor, body)),
    route(getCase, ({ actor, params }) => readCase(deps, actor, params.caseId)),
    route(editCase, ({ actor, params, body }) => changeCase(deps, actor, params.caseId, body)),
    route(reopenCase, ({ actor, params, body }) => reopen(deps, actor, params.caseId, body.reason)),
  ];
}
