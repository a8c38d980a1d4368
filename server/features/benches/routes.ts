import type { Deps } from '#server/deps.ts';
import { allBenches, changeBench, createBench } from '#server/features/benches/service.ts';
import { route, type Route } from '#server/http/route.ts';
import { addBench, editBench, listBenches } from '#shared/contracts/benches.ts';
import { permits } from '#shared/permissions.ts';

export function benchRoutes(deps: Deps): Route[] {
  return [
    route(listBenches, async ({ actor }) => ({
      benches: await allBenches(deps, actor),
      can: { add: permits(actor.roles, 'edit-benches') },
    })),
    route(addBench, ({ actor, body }) => createBench(deps, actor, body)),
    route(editBench, ({ actor, params, body }) => changeBench(deps, actor, params.benchId, body)),
  ];
}
