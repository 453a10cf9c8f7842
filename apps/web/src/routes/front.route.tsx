import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { useQuery } from '@tanstack/react-query';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../app/paths';
import { CallSheet } from '../features/calls/components/CallSheet';
import { LightPath } from '../features/calls/components/LightPath';
import { sessionQueries } from '../lib/queries/session';
import { useDocumentTitle } from '../lib/useDocumentTitle';
import { EmptyState } from '../ui/EmptyState';
import { Loaded, SkeletonBlock } from '../ui/PageStates';

/** The front page: what this is, the open calls, and what needs no account. */
export function Component() {
  useDocumentTitle('Faintward');
  const calls = useQuery(sessionQueries.calls());
  const me = useQuery(sessionQueries.me()).data;
  return (
    <Box sx={{ maxWidth: 1360, mx: 'auto', px: { xs: 2, md: 5 }, pt: { xs: 4, md: 7 }, pb: 6 }}>
      <Typography variant="body2" color="textSecondary">
        {calls.data?.observatoryName ?? '\u00a0'}
      </Typography>
      <Typography variant="h1" sx={{ fontSize: { xs: '2rem', md: '2.75rem' }, maxWidth: 900, textWrap: 'balance' }}>
        From a redshift to a night at the telescope
      </Typography>
      <Typography variant="reading" component="p" sx={{ mt: 1.5, maxWidth: 720 }}>
        Faintward turns a list of distant sources into exposure times, requests, fair rankings and hours, with one set
        of numbers that anybody can open and trace.
      </Typography>
      <LightPath />
      <Box
        sx={{
          display: 'grid',
          gridTemplateColumns: { xs: 'minmax(0, 1fr)', lg: 'minmax(0, 1.7fr) minmax(0, 1fr)' },
          gap: { xs: 4, lg: 8 },
          mt: { xs: 3, md: 5 },
        }}
      >
        <Box component="section" aria-label="Calls for proposals">
          <Loaded query={calls} what="The calls" skeleton={<SkeletonBlock label="The calls: loading" lines={7} />}>
            {(open) =>
              open.calls.length === 0 ? (
                <EmptyState title="No call is open">The next call will be announced on this page.</EmptyState>
              ) : (
                <Box sx={{ display: 'grid', gap: 5 }}>
                  {open.calls.map((call) => (
                    <CallSheet
                      key={call.semesterId}
                      call={call}
                      action={
                        call.stage === 'open' && (
                          <>
                            <Button
                              variant="contained"
                              component={RouterLink}
                              to={me ? paths.newProposal.to() : paths.signIn.to(paths.newProposal.to())}
                            >
                              Write a proposal
                            </Button>
                            {me && (
                              <Button component={RouterLink} to={paths.proposals.to()}>
                                My proposals
                              </Button>
                            )}
                          </>
                        )
                      }
                    />
                  ))}
                </Box>
              )
            }
          </Loaded>
        </Box>
        <Box
          component="section"
          aria-labelledby="calculators"
          sx={{ borderTop: 2, borderColor: 'text.primary', pt: 2 }}
        >
          <Typography variant="body2" color="textSecondary">
            No account needed
          </Typography>
          <Typography variant="h2" id="calculators" sx={{ fontSize: '1.625rem' }}>
            Try a number
          </Typography>
          <Entry
            title="Distances and dimming"
            to={paths.distances.to()}
            text="All distances, scale, ages and the dimming in its four conventions, for one redshift or a pasted list, in two cosmologies side by side."
          />
          <Entry
            title="Exposure sketchpad"
            to={paths.exposure.to()}
            text="How long until a source is reached with one of our instruments, with the light budget that leads there."
          />
          <Entry
            title="Instruments"
            to={paths.instruments.to()}
            text="Telescopes, instruments and modes, with the configuration that every estimate uses."
          />
        </Box>
      </Box>
    </Box>
  );
}

function Entry({ title, text, to }: { title: string; text: string; to: string }) {
  return (
    <Box
      component={RouterLink}
      to={to}
      sx={{
        display: 'block',
        py: 1.75,
        borderBottom: 1,
        borderColor: 'divider',
        textDecoration: 'none',
        color: 'text.primary',
        '&:hover .entry-title': { textDecoration: 'underline' },
      }}
    >
      <Typography
        variant="h3"
        component="span"
        className="entry-title"
        sx={{ color: 'primary.main', display: 'block' }}
      >
        {title} <span aria-hidden="true">→</span>
      </Typography>
      <Typography color="textSecondary" component="span" sx={{ display: 'block' }}>
        {text}
      </Typography>
    </Box>
  );
}
