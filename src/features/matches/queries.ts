import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import { getMatch, listMatches, type MatchState } from '#shared/contracts/matches.ts';

const pageSize = 50;

export type ReviewFilter = MatchState | 'decide' | 'all';

/** One page of the review table. `decide`: only what the reader may decide on. */
export function matchesQuery({ filter, page }: { filter: ReviewFilter; page: number }) {
  return queryOptions({
    queryKey: ['matches', 'list', filter, page],
    queryFn: ({ signal }) =>
      call(listMatches, {
        query: {
          page,
          pageSize,
          ...(filter === 'decide' ? { mine: 'decide' as const } : filter === 'all' ? {} : { state: filter }),
        },
        signal,
      }),
    placeholderData: keepPreviousData,
    refetchInterval: 30_000,
  });
}

export function matchQuery(matchId: string) {
  return queryOptions({
    queryKey: ['matches', matchId],
    queryFn: ({ signal }) => call(getMatch, { params: { matchId }, signal }),
  });
}
