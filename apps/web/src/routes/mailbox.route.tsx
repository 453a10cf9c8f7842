import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { useQuery } from '@tanstack/react-query';
import { mailboxQueries } from '../features/mailbox/api/mailbox';
import { EmptyState } from '../ui/EmptyState';
import { Loaded } from '../ui/PageStates';
import { PageFrame } from '../ui/PageFrame';
import { Panel } from '../ui/Panel';
import { TimeDisplay } from '../ui/TimeDisplay';

/** What the local mail service caught: letters that would have left the observatory. */
export function Component() {
  const query = useQuery(mailboxQueries.list());
  return (
    <PageFrame
      title="Mailbox"
      eyebrow="Letters caught by the local mail service; none has left this machine"
      width="reading"
    >
      <Loaded query={query} what="The mailbox">
        {({ rows }) =>
          rows.length === 0 ? (
            <Panel>
              <EmptyState title="No letters yet">
                Ask for a new password or invite somebody, and the letter will appear here.
              </EmptyState>
            </Panel>
          ) : (
            <Panel flush>
              {rows.map((message) => (
                <Box
                  component="details"
                  key={message.messageId}
                  sx={{ borderBottom: 1, borderColor: 'divider', '&:last-child': { border: 0 } }}
                >
                  <Box component="summary" sx={{ p: 2, cursor: 'pointer' }}>
                    <strong>{message.subject}</strong>
                    <Typography variant="body2" color="textSecondary" component="span" sx={{ display: 'block', pl: 2 }}>
                      to {message.to}, <TimeDisplay instant={message.receivedAt} short />
                    </Typography>
                  </Box>
                  <Typography
                    variant="figure"
                    component="div"
                    sx={{ px: 4, pb: 2, whiteSpace: 'pre-wrap', overflowWrap: 'anywhere' }}
                  >
                    {linked(message.text)}
                  </Typography>
                </Box>
              ))}
            </Panel>
          )
        }
      </Loaded>
    </PageFrame>
  );
}

/** Addresses of this very server become links; foreign ones stay text. */
function linked(text: string) {
  return text.split(/(https?:\/\/\S+)/).map((part, index) => {
    if (index % 2 === 0) return part;
    const url = URL.parse(part);
    return url?.origin === window.location.origin ? (
      <a key={index} href={part}>
        {part}
      </a>
    ) : (
      part
    );
  });
}
