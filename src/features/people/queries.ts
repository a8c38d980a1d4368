import { queryOptions } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import { listPeople } from '#shared/contracts/people.ts';

export const peopleQuery = queryOptions({
  queryKey: ['people'],
  queryFn: ({ signal }) => call(listPeople, { signal }),
});
