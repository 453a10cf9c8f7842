import { MailboxMessage } from '@faintward/contracts/accounts';
import { queryOptions } from '@tanstack/react-query';
import { z } from 'zod';
import { api } from '../../../lib/api';

export const mailboxQueries = {
  list: () =>
    queryOptions({
      queryKey: ['mailbox'],
      queryFn: ({ signal }) => api({ path: '/mailbox', schema: z.object({ rows: z.array(MailboxMessage) }), signal }),
      refetchInterval: 10_000,
    }),
};
