import { queryOptions } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import { listBenches } from '#shared/contracts/benches.ts';

export const benchesQuery = queryOptions({
  queryKey: ['benches'],
  queryFn: ({ signal }) => call(listBenches, { signal }),
});
