import { EmptyState } from '../ui/EmptyState';
import { PageFrame } from '../ui/PageFrame';

/** A page that the route table already names and nobody has drawn yet. */
export function placeholder(title: string) {
  return function Placeholder() {
    return (
      <PageFrame title={title} width="reading">
        <EmptyState title="This page is being written" />
      </PageFrame>
    );
  };
}
