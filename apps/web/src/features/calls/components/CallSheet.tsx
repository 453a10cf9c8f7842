import type { Semester } from '@faintward/contracts/semesters';
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import type { ReactNode } from 'react';
import { formatNumber } from '../../../lib/format';
import { colour } from '../../../theme/theme';
import { PlainTable } from '../../../ui/PlainTable';
import { PlainText } from '../../../ui/PlainText';
import { Countdown, TimeDisplay } from '../../../ui/TimeDisplay';

const moonClasses = ['dark', 'grey', 'bright'] as const;
const moonFill = { dark: colour.ink, grey: colour.edge, bright: colour.moon };

/** One call: until when, and the hours that there are to share out, by telescope and moon class. */
export function CallSheet({ call, action }: { call: Semester; action?: ReactNode }) {
  const isOpen = call.stage === 'open';
  const most = Math.max(
    1,
    ...call.telescopes.map((one) => moonClasses.reduce((sum, moon) => sum + one.availableHours[moon], 0)),
  );
  return (
    <Box component="article" aria-label={`Call for ${call.name}`} sx={{ borderTop: `2px solid ${colour.ink}`, pt: 2 }}>
      <Box sx={{ display: 'flex', gap: 3, flexWrap: 'wrap', alignItems: 'flex-end' }}>
        <Box sx={{ flex: '1 1 320px', minWidth: 0 }}>
          <Typography variant="body2" color="textSecondary">
            {isOpen ? 'Call for proposals, open' : 'Call for proposals, announced'}
          </Typography>
          <Typography variant="h2" sx={{ fontSize: '1.625rem' }}>
            {call.name}
          </Typography>
        </Box>
        <Box sx={{ flex: '0 1 auto' }}>
          <Typography variant="body2" color="textSecondary">
            {isOpen ? 'Closes in' : 'Opens in'}
          </Typography>
          <Typography sx={{ fontSize: '1.625rem', fontWeight: 600, lineHeight: 1.3, color: 'faintward.accent' }}>
            <Countdown until={isOpen ? call.deadlineAt : call.callOpensAt} />
          </Typography>
        </Box>
      </Box>
      <Typography sx={{ mt: 0.5 }}>
        Deadline <TimeDisplay instant={call.deadlineAt} siteTimeZone={call.siteTimeZone} />
      </Typography>
      {call.callText && (
        <Box sx={{ mt: 1.5 }}>
          <PlainText text={call.callText} />
        </Box>
      )}
      <PlainTable
        sx={{
          mt: 2,
          '& th, & td': { borderBottom: 1, borderColor: 'divider', py: 0.9, px: 1.25, textAlign: 'right' },
          '& thead th:first-of-type, & tbody th': { pl: 0, textAlign: 'left' },
          '& thead th': { color: 'text.secondary', fontSize: '0.8125rem' },
          '& small': { display: 'block', fontWeight: 400 },
          '& .bar': { width: '34%', display: { xs: 'none', sm: 'table-cell' } },
        }}
      >
        <thead>
          <tr>
            <th scope="col">Hours to share out</th>
            {moonClasses.map((moon) => (
              <th scope="col" key={moon}>
                {moon}
                <small>h</small>
              </th>
            ))}
            <td className="bar" aria-hidden="true" />
          </tr>
        </thead>
        <tbody>
          {call.telescopes.map((telescope) => (
            <tr key={telescope.telescopeId}>
              <Box component="th" scope="row" sx={{ fontWeight: 600 }}>
                {telescope.telescopeName}
              </Box>
              {moonClasses.map((moon) => (
                <td key={moon}>{formatNumber(telescope.availableHours[moon], { decimals: 0 })}</td>
              ))}
              <td className="bar" aria-hidden="true">
                <Box sx={{ display: 'flex', height: 10, width: '100%' }}>
                  {moonClasses.map((moon) => (
                    <Box
                      key={moon}
                      sx={{
                        width: `${(100 * telescope.availableHours[moon]) / most}%`,
                        background: moonFill[moon],
                        border: `1px solid ${colour.edge}`,
                        borderLeftWidth: moon === 'dark' ? 1 : 0,
                      }}
                    />
                  ))}
                </Box>
              </td>
            </tr>
          ))}
        </tbody>
      </PlainTable>
      {action && <Box sx={{ mt: 2, display: 'flex', gap: 1.25, flexWrap: 'wrap' }}>{action}</Box>}
    </Box>
  );
}
