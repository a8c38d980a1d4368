import type { Actor } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import {
  decide,
  matchesOfCase,
  putForward,
  readMatch,
  reviewTable,
} from '#server/features/matches/service.ts';
import { route, type Route } from '#server/http/route.ts';
import { attemptLimit } from '#server/http/security.ts';
import { decideMatch, getMatch, listMatches, submitMatch } from '#shared/contracts/matches.ts';

async function withEarlier(deps: Deps, actor: Actor, id: string) {
  const match = await readMatch(deps, actor, id);
  const all = await matchesOfCase(deps, actor, match.caseId);
  return { ...match, earlier: all.filter((m) => m.version < match.version) };
}

export function matchRoutes(deps: Deps): Route[] {
  return [
    route(submitMatch, ({ actor, params, body }) => putForward(deps, actor, params.caseId, body)),
    route(listMatches, ({ actor, query }) => reviewTable(deps, actor, query)),
    route(getMatch, ({ actor, params }) => withEarlier(deps, actor, params.matchId)),
    route(decideMatch, ({ actor, params, body }) => decide(deps, actor, params.matchId, body), [
      attemptLimit(10, (req) => req.user?.id ?? ''),
    ]),
  ];
}
