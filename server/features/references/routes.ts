import type { Deps } from '#server/deps.ts';
import { listLibrary } from '#server/features/references/service.ts';
import { route, type Route } from '#server/http/route.ts';
import { listReferences } from '#shared/contracts/references.ts';

export function referenceRoutes(deps: Deps): Route[] {
  return [route(listReferences, ({ query }) => listLibrary(deps, query))];
}
