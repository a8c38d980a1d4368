import { queryOptions } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import {
  getIdentification,
  listIdentifications,
  type Identification,
} from '#shared/contracts/identifications.ts';

export function isUnderWay(run: Pick<Identification, 'state'> | undefined): boolean {
  return run?.state === 'queued' || run?.state === 'running';
}

/** All runs of an exposure, newest first; asks again while the newest is under way. */
export function runsQuery(exposureId: string) {
  return queryOptions({
    queryKey: ['identifications', 'of', exposureId],
    queryFn: async ({ signal }) =>
      (await call(listIdentifications, { params: { exposureId }, signal })).identifications,
    refetchInterval: (query) => (isUnderWay(query.state.data?.[0]) ? 700 : false),
  });
}

export function runQuery(identificationId: string) {
  return queryOptions({
    queryKey: ['identifications', identificationId],
    queryFn: ({ signal }) => call(getIdentification, { params: { identificationId }, signal }),
  });
}
