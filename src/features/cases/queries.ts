import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import { getCase, listCases } from '#shared/contracts/cases.ts';

/** Pages are this long: a laboratory's open work fits on one. */
const pageSize = 100;
const soon = 1_500;

/** One page of the work list; asks again while something runs. */
export function casesQuery({ page, q }: { page: number; q: string }) {
  return queryOptions({
    queryKey: ['cases', 'list', page, q],
    queryFn: ({ signal }) => call(listCases, { query: { page, pageSize, ...(q ? { q } : {}) }, signal }),
    placeholderData: keepPreviousData,
    refetchInterval: (query) =>
      query.state.data?.rows.some((row) => row.stage === 'running') ? soon : 20_000,
  });
}

/** One case; asks again while one of its exposures is being identified. */
export function caseQuery(caseId: string) {
  return queryOptions({
    queryKey: ['cases', caseId],
    queryFn: ({ signal }) => call(getCase, { params: { caseId }, signal }),
    refetchInterval: (query) =>
      query.state.data?.exposures.some((e) => e.latest?.state === 'queued' || e.latest?.state === 'running')
        ? soon
        : false,
  });
}
