import type { Estimate } from '@faintward/contracts/estimates';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Collapse from '@mui/material/Collapse';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { formatDuration, formatNumber } from '../../../lib/format';
import { LightBudget } from '../../../ui/LightBudget';
import { Note } from '../../../ui/Note';
import { limitWords, perWords } from '../../../ui/estimate/estimateWords';

/** The answer in three numbers, with the light budget a click away. */
export function EstimateSummary({ estimate }: { estimate: Estimate }) {
  const [open, setOpen] = useState(false);
  return (
    <Stack sx={{ gap: 1.25 }}>
      <Box aria-live="polite">
        {estimate.outcome === 'feasible' ? (
          <>
            <Box component="dl" sx={{ display: 'flex', columnGap: 3.5, rowGap: 1, flexWrap: 'wrap', m: 0 }}>
              <Figure label="With overheads" value={formatDuration(estimate.totalSeconds)} />
              <Figure
                label="Exposures"
                value={`${formatNumber(estimate.exposureCount, { decimals: 0 })} × ${formatDuration(estimate.exposureSeconds)}`}
              />
              <Figure
                label={`S/N per ${perWords[estimate.signalToNoisePer]}`}
                value={formatNumber(estimate.signalToNoise, { significant: 3 })}
              />
            </Box>
            <Typography variant="body2" color="textSecondary" sx={{ mt: 0.75 }}>
              Open shutter {formatDuration(estimate.openShutterSeconds)}; limited by {limitWords[estimate.limitedBy]}.
            </Typography>
          </>
        ) : (
          <Note tone="error">Not feasible. {estimate.reason.message}</Note>
        )}
      </Box>
      {estimate.notices.map((notice) => (
        <Note key={`${notice.code} ${notice.message}`} tone={notice.severity}>
          {notice.message}
        </Note>
      ))}
      {estimate.steps.length > 0 && (
        <Box>
          <Button size="small" variant="text" aria-expanded={open} onClick={() => setOpen(!open)} sx={{ ml: -0.75 }}>
            {open ? 'Hide the light budget' : 'Light budget'}
          </Button>
          <Collapse in={open} unmountOnExit>
            <LightBudget steps={estimate.steps} />
          </Collapse>
        </Box>
      )}
    </Stack>
  );
}

function Figure({ label, value }: { label: string; value: string }) {
  return (
    <div>
      <Typography variant="body2" color="textSecondary" component="dt">
        {label}
      </Typography>
      <Box component="dd" sx={{ m: 0, fontSize: '1.25rem', fontWeight: 600, lineHeight: 1.3, whiteSpace: 'nowrap' }}>
        {value}
      </Box>
    </div>
  );
}
