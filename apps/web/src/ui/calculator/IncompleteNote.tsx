import { Note } from '../Note';

/** Above the answer of a form in which something is missing or wrong. */
export function IncompleteNote({ hasAnswer }: { hasAnswer: boolean }) {
  return (
    <Note tone="warning">
      Something in the form is not complete yet{hasAnswer ? ': this is the answer to what stood there before' : ''}.
    </Note>
  );
}
