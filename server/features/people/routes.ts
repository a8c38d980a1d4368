import type { Deps } from '#server/deps.ts';
import { changePerson, createPerson, listAllPeople } from '#server/features/people/service.ts';
import { route, type Route } from '#server/http/route.ts';
import { addPerson, editPerson, listPeople } from '#shared/contracts/people.ts';

export function peopleRoutes(deps: Deps): Route[] {
  return [
    route(listPeople, async () => ({ people: await listAllPeople(deps) })),
    route(addPerson, ({ actor, body }) => createPerson(deps, actor, body)),
    route(editPerson, ({ actor, params, body }) => changePerson(deps, actor, params.personId, body)),
  ];
}
