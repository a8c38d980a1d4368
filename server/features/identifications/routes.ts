import type { Deps } from '#server/deps.ts';
import {
  cancel,
  identificationsOf,
  readIdentification,
  startAnew,
} from '#server/features/identifications/service.ts';
import { route, type Route } from '#server/http/route.ts';
import {
  cancelIdentification,
  getIdentification,
  listIdentifications,
  startIdentification,
} from '#shared/contracts/identifications.ts';

export function identificationRoutes(deps: Deps): Route[] {
  return [
    route(startIdentification, ({ actor, params }) => startAnew(deps, actor, params.exposureId)),
    route(listIdentifications, async ({ actor, params }) => ({
      identifications: await identificationsOf(deps, actor, params.exposureId),
    })),
    route(getIdentification, ({ actor, params }) => readIdentification(deps, actor, params.identificationId)),
    route(cancelIdentification, ({ actor, params }) => cancel(deps, actor, params.identificationId)),
  ];
}
