import { useQuery } from '@tanstack/react-query';
import { reviewQueries } from '../features/reviews/api/reviews';
import { ReadingListView } from '../features/reviews/components/ReadingListView';
import { EmptyState } from '../ui/EmptyState';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';

/** What a committee member has to read. */
export function Component() {
  const query = useQuery(reviewQueries.readingList());
  return (
    <PageFrame title="Reading list">
      <Loaded query={query} what="Your reading list">
        {(list) =>
          list.rows.length === 0 && list.conflictCount === 0 ? (
            <EmptyState title="Nothing is assigned to you">
              Proposals appear here when the chair of a panel assigns them, after the deadline of the call.
            </EmptyState>
          ) : (
            <ReadingListView list={list} />
          )
        }
      </Loaded>
    </PageFrame>
  );
}
