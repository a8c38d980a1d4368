import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { useMay } from '#src/lib/session.ts';
import { useTitle } from '#src/lib/title.ts';
import { Choice } from '#src/ui/choice.tsx';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { Pager } from '#src/ui/pager.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { queueSentence } from '#src/features/matches/match-words.ts';
import { matchesQuery, type ReviewFilter } from '#src/features/matches/queries.ts';
import { ReviewTable } from '#src/features/matches/review-table.tsx';

const filters: readonly { value: ReviewFilter; label: string }[] = [
  { value: 'all', label: 'All' },
  { value: 'submitted', label: 'Waiting' },
  { value: 'confirmed', label: 'Confirmed' },
  { value: 'returned', label: 'Sent back' },
  { value: 'rejected', label: 'Rejected' },
];

export function Component() {
  const [search, setSearch] = useSearchParams();
  const filter = filters.find((f) => f.value === search.get('state'))?.value ?? 'all';
  const page = Math.max(1, Number(search.get('page')) || 1);
  const mayDecide = useMay('decide-matches');
  const waiting = useQuery(matchesQuery({ filter: mayDecide ? 'decide' : 'submitted', page: 1 }));
  const list = useQuery(matchesQuery({ filter, page }));
  useTitle('Review');
  return (
    <>
      <Sentence below="Nobody decides on a match that they put forward themselves.">
        {waiting.data ? queueSentence(waiting.data.total, mayDecide) : 'Review'}
      </Sentence>
      <div className="mb-4">
        <Choice
          label="State"
          options={filters}
          value={filter}
          onChoose={(value) => setSearch(value === 'all' ? {} : { state: value })}
        />
      </div>
      <ProblemNotice error={list.error} onRetry={() => void list.refetch()} />
      {list.isPending ? <Loading what="the matches" /> : null}
      {list.data?.rows.length === 0 ? (
        <EmptyState
          fact={filter === 'all' ? 'No match has been put forward yet.' : 'No match is in this state.'}
          next="An analyst puts a candidate forward on the page of its exposure."
        />
      ) : null}
      {list.data && list.data.rows.length > 0 ? (
        <>
          <ReviewTable matches={list.data.rows} />
          <Pager page={list.data.page} pageSize={list.data.pageSize} total={list.data.total} what="matches" />
        </>
      ) : null}
    </>
  );
}
