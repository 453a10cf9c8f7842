import type { RedshiftDistributionReading } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { ApiError } from '../../lib/api';
import { counted, formatNumber } from '../../lib/format';
import { Note } from '../Note';
import { ProblemDisplay } from '../ProblemDisplay';
import { DraftChoice, DraftField, FieldGrid, type DraftProps } from './DraftFields';
import { redshiftKindOptions } from './lightWords';
import { useReadDistribution } from './lightQueries';
import { uncertaintyPart, type RedshiftDraft } from './redshiftDraft';
import { TableTextField } from './TableTextField';

/** A redshift, where it comes from and how well it is known. Draws; its owner keeps the draft. */
export function RedshiftFields({
  redshiftHint,
  ...props
}: DraftProps<RedshiftDraft> & { redshiftHint?: string | undefined }) {
  const { draft } = props;
  return (
    <FieldGrid>
      <DraftField {...props} name="redshift" label="Redshift" hint={redshiftHint} />
      <DraftChoice {...props} name="redshiftKind" label="It is" options={redshiftKindOptions} />
      <DraftChoice
        {...props}
        name="uncertainty"
        label="Its uncertainty"
        options={[
          ['none', 'not given'],
          ['gaussian', '± 1 σ'],
          ['percentiles', '16, 50 and 84 %'],
          ['table', 'a table p(z)'],
        ]}
      />
      {draft.uncertainty === 'gaussian' && <DraftField {...props} name="sigmaZ" label="σ of z" />}
      {draft.uncertainty === 'percentiles' && (
        <>
          <DraftField {...props} name="p16" label="z at 16 %" />
          <DraftField {...props} name="p50" label="z at 50 %" />
          <DraftField {...props} name="p84" label="z at 84 %" />
        </>
      )}
      {draft.uncertainty === 'table' && <DistributionField {...props} />}
    </FieldGrid>
  );
}

function DistributionField({ draft, errors, disabled = false, onChange }: DraftProps<RedshiftDraft>) {
  const reading = useReadDistribution();
  const [text, setText] = useState('');
  const [isReplacing, setIsReplacing] = useState(draft.table === null);
  const own =
    reading.error instanceof ApiError ? reading.error.fieldErrors.map((fault) => fault.message).join(' ') : '';
  const read = () =>
    reading.mutate(text, {
      onSuccess: ({ uncertainty }) => {
        onChange(uncertaintyPart(uncertainty));
        setIsReplacing(false);
      },
    });
  return (
    <Box sx={{ gridColumn: '1 / -1', display: 'grid', gap: 1.25 }}>
      {draft.table && (
        <Box role="status" sx={{ bgcolor: 'faintward.raised', px: 1.75, py: 1, fontSize: '0.875rem' }}>
          Table of {counted(draft.table.redshifts.length, 'point')}, z{' '}
          {formatNumber(draft.table.redshifts[0], { significant: 3 })} to{' '}
          {formatNumber(draft.table.redshifts.at(-1), { significant: 3 })}.
          {reading.data && <Peaks reading={reading.data} />}
        </Box>
      )}
      {reading.data?.notices.map((notice) => (
        <Note key={`${notice.code} ${notice.message}`} tone={notice.severity}>
          {notice.message}
        </Note>
      ))}
      {isReplacing || draft.table === null ? (
        <>
          <TableTextField
            label="p(z): redshift and probability density"
            value={text}
            error={own || errors.table}
            disabled={disabled || reading.isPending}
            placeholder={'2.2  0.1\n2.3  0.9\n7.0  0.5'}
            onChange={(next) => {
              reading.reset();
              setText(next);
            }}
          />
          {reading.error && !own && <ProblemDisplay error={reading.error} what="Not read; the table is still here" />}
          <Box>
            <Button disabled={disabled || text.trim() === ''} loading={reading.isPending} onClick={read}>
              Read the table
            </Button>
          </Box>
        </>
      ) : (
        <Box>
          <Button size="small" variant="text" disabled={disabled} onClick={() => setIsReplacing(true)}>
            Another table
          </Button>
        </Box>
      )}
    </Box>
  );
}

function Peaks({ reading: { peaks, quantiles } }: { reading: RedshiftDistributionReading }) {
  const z = (value: number) => formatNumber(value, { significant: 3 });
  return (
    <>
      <Typography variant="body2">
        {counted(peaks.length, 'peak')}:{' '}
        {peaks
          .map((peak) => `z ${z(peak.redshift)} with ${formatNumber(100 * peak.probability, { decimals: 0 })} %`)
          .join(', ')}
        .
      </Typography>
      <Typography variant="body2" color="textSecondary">
        16, 50, 84 %: z {z(quantiles.p16)}, {z(quantiles.p50)}, {z(quantiles.p84)}.
      </Typography>
    </>
  );
}
