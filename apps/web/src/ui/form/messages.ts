import { z } from 'zod';

/** What a field says when its schema has no words of its own. */
function wordsForIssue(issue: z.core.$ZodRawIssue): string | undefined {
  if (issue.code === 'invalid_type') {
    if (issue.input === null || issue.input === undefined || issue.input === '') return 'Please fill this in.';
    return issue.expected === 'number' || issue.expected === 'int' ? 'A number is needed here.' : undefined;
  }
  if (issue.code === 'too_small' && isNumeric(issue.origin)) {
    return `${issue.inclusive === false ? 'More than' : 'At least'} ${plain(issue.minimum)}.`;
  }
  if (issue.code === 'too_big' && isNumeric(issue.origin)) {
    return `${issue.inclusive === false ? 'Less than' : 'At most'} ${plain(issue.maximum)}.`;
  }
  return undefined;
}

const isNumeric = (origin: string) => origin === 'number' || origin === 'int';
const plain = (value: number | bigint) => String(value).replace(/^-/, '−');

z.config({ customError: wordsForIssue });
