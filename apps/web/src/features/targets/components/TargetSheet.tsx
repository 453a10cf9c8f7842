import type { DistancesResponse } from '@faintward/contracts/distances';
import type { Target } from '@faintward/contracts/targets';
import CloseIcon from '@mui/icons-material/Close';
import Box from '@mui/material/Box';
import Drawer from '@mui/material/Drawer';
import IconButton from '@mui/material/IconButton';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import type { ReactNode } from 'react';
import { formatNumber } from '../../../lib/format';
import { Note } from '../../../ui/Note';
import { Loaded, type QueryState } from '../../../ui/PageStates';
import { Explained, Quantity } from '../../../ui/Quantity';
import { RedshiftValue } from '../../../ui/RedshiftValue';
import { describeExtent, redshiftDecimals } from '../cells';
import { dimmingQuantities, lightQuantities, targetQuantities } from '../quantities';
import { LightForm } from './LightForm';

export interface TargetSheetProps {
  proposalId: string;
  /** Undefined: the sheet is closed. */
  targetId: string | undefined;
  query: QueryState<Target>;
  /** The conventional model beside the proposal's, and the dimming of this redshift. */
  beside: QueryState<DistancesResponse>;
  canEdit: boolean;
  /** Its observations with their light budgets. */
  observations: ReactNode;
  onClose: () => void;
}

/** Everything about one target, beside the table. */
export function TargetSheet(props: TargetSheetProps) {
  const { targetId, query, onClose } = props;
  return (
    <Drawer
      anchor="right"
      open={targetId !== undefined}
      onClose={onClose}
      slotProps={{
        paper: {
          role: 'dialog',
          'aria-modal': true,
          'aria-label': query.data ? `Target ${query.data.name}` : 'Target',
          sx: { width: { xs: '100%', md: 680 }, backgroundImage: 'none' },
        },
      }}
    >
      <Box
        sx={{
          position: 'sticky',
          top: 0,
          zIndex: 1,
          bgcolor: 'background.paper',
          borderBottom: 1,
          borderColor: 'divider',
        }}
      >
        <Stack direction="row" sx={{ alignItems: 'flex-start', px: { xs: 2, md: 3 }, py: 1.75, gap: 2 }}>
          <Box sx={{ flex: 1, minWidth: 0 }}>{query.data ? <Head target={query.data} /> : 'Target'}</Box>
          <IconButton onClick={onClose} aria-label="Close the sheet" size="small">
            <CloseIcon fontSize="small" />
          </IconButton>
        </Stack>
      </Box>
      <Box sx={{ px: { xs: 2, md: 3 }, pb: 4, pt: 2 }}>
        {targetId !== undefined && (
          <Loaded query={query} what="The target">
            {(target) => <Sheet key={target.targetId} {...props} target={target} />}
          </Loaded>
        )}
      </Box>
    </Drawer>
  );
}

function Head({ target }: { target: Target }) {
  return (
    <>
      <Typography variant="h2" sx={{ overflowWrap: 'anywhere' }}>
        {target.name}
      </Typography>
      <Box sx={{ display: 'flex', columnGap: 2, flexWrap: 'wrap', alignItems: 'center', mt: 0.25 }}>
        <Typography variant="figure" component="span">
          {target.rightAscensionText} {target.declinationText}
        </Typography>
        <RedshiftValue
          redshift={target.redshift}
          uncertainty={target.redshiftSigma}
          decimals={redshiftDecimals(target.redshift)}
        />
      </Box>
    </>
  );
}

function Sheet({ proposalId, target, beside, canEdit, observations }: TargetSheetProps & { target: Target }) {
  const { computed } = target;
  const conventional = beside.data?.rows[0];
  return (
    <Stack sx={{ gap: 3 }}>
      {computed.notices.length > 0 && (
        <Stack sx={{ gap: 1 }}>
          {computed.notices.map((notice) => (
            <Note key={`${notice.code} ${notice.message}`} tone={notice.severity}>
              {notice.message}
            </Note>
          ))}
        </Stack>
      )}
      <Block title="Light and size">
        <Values>
          <tbody>
            <tr>
              <th scope="row">As known</th>
              <td>{target.brightnessText || 'not given'}</td>
            </tr>
            {lightQuantities.map((quantity) => (
              <tr key={quantity.field}>
                <th scope="row">
                  {quantity.label}
                  {quantity.field === 'apparentMagnitudeAb' &&
                    computed.magnitudeLabel &&
                    `, ${computed.magnitudeLabel}`}
                </th>
                <td>
                  <Quantity
                    value={computed[quantity.field]}
                    unit={quantity.unit}
                    unknownReason={quantity.unknown}
                    strong
                    {...quantity.format}
                    explanation={{
                      title: quantity.label,
                      meaning: quantity.meaning,
                      formula: quantity.formula,
                      inputs: [
                        { label: 'light', value: target.brightnessText || 'not given' },
                        { label: 'spread', value: describeExtent(target.extent) },
                        { label: 'redshift z', value: formatNumber(target.redshift, { significant: 6 }) },
                      ],
                      source: quantity.source,
                    }}
                  />
                </td>
              </tr>
            ))}
          </tbody>
        </Values>
        {canEdit && (
          <Box sx={{ mt: 2 }}>
            <LightForm proposalId={proposalId} target={target} />
          </Box>
        )}
      </Block>
      <Block title="Distances and times">
        <Values>
          <thead>
            <tr>
              <td />
              <th scope="col">{computed.cosmologyId}</th>
              <th scope="col" className="beside">
                {conventional ? '70 / 0.3' : beside.error ? 'not loaded' : '…'}
              </th>
            </tr>
          </thead>
          <tbody>
            {targetQuantities.map((quantity) => (
              <tr key={quantity.field}>
                <th scope="row">{quantity.label}</th>
                <td>
                  <Quantity
                    value={computed[quantity.field]}
                    unit={quantity.unit}
                    strong
                    {...quantity.format}
                    explanation={{
                      title: quantity.label,
                      meaning: quantity.meaning,
                      formula: quantity.formula,
                      inputs: [
                        { label: 'redshift z', value: formatNumber(target.redshift, { significant: 6 }) },
                        { label: 'cosmology', value: computed.cosmologyId },
                      ],
                      source: quantity.source,
                    }}
                  />
                </td>
                <td className="beside">
                  <Quantity value={conventional?.[quantity.field]} unit={quantity.unit} {...quantity.format} />
                </td>
              </tr>
            ))}
          </tbody>
        </Values>
      </Block>
      <Block
        title="Dimming of its surface"
        note="How many magnitudes per square arcsecond expansion takes depends on what is counted. It is the same in every cosmology."
      >
        {conventional ? (
          <Values>
            <tbody>
              {dimmingQuantities.map((quantity) => (
                <tr key={quantity.field}>
                  <th scope="row">
                    {quantity.label} <span className="soft">{quantity.powers}</span>
                  </th>
                  <td>
                    <Quantity
                      value={conventional[quantity.field]}
                      unit={quantity.unit}
                      strong
                      {...quantity.format}
                      explanation={{
                        title: quantity.label,
                        meaning: quantity.meaning,
                        formula: quantity.formula,
                        inputs: [{ label: 'redshift z', value: formatNumber(target.redshift, { significant: 6 }) }],
                        source: quantity.source,
                      }}
                    />
                  </td>
                </tr>
              ))}
            </tbody>
          </Values>
        ) : (
          <Loaded query={beside} what="The dimming">
            {() => null}
          </Loaded>
        )}
      </Block>
      <UpByMonth target={target} />
      <Block title="Observations">{observations}</Block>
      {target.notes && (
        <Block title="Notes">
          <Typography sx={{ whiteSpace: 'pre-wrap', overflowWrap: 'anywhere' }}>{target.notes}</Typography>
        </Block>
      )}
      <Typography variant="body2" color="textSecondary">
        {computed.cosmologyId}, engine {computed.engineVersion}, inputs <code>{computed.inputHash.slice(0, 12)}</code>.
      </Typography>
    </Stack>
  );
}

function Block({ title, note, children }: { title: string; note?: string; children: ReactNode }) {
  return (
    <Box component="section" aria-label={title}>
      <Typography variant="h3" sx={{ mb: note ? 0.25 : 0.75 }}>
        {title}
      </Typography>
      {note && (
        <Typography variant="body2" color="textSecondary" sx={{ mb: 0.75 }}>
          {note}
        </Typography>
      )}
      {children}
    </Box>
  );
}

function Values({ children }: { children: ReactNode }) {
  return (
    <Box
      component="table"
      sx={{
        width: '100%',
        borderCollapse: 'collapse',
        fontSize: '0.875rem',
        '& td, & th': { borderBottom: 1, borderColor: 'divider', py: 0.6, px: 1, textAlign: 'right' },
        '& tbody th': { textAlign: 'left', pl: 0, fontWeight: 400 },
        '& thead th': { color: 'text.secondary', fontSize: '0.8125rem', fontWeight: 600 },
        '& .beside': { bgcolor: 'faintward.raised' },
        '& .soft': { color: 'text.secondary' },
      }}
    >
      {children}
    </Box>
  );
}

/** Hours a night that it stands high enough in the dark, month by month. */
function UpByMonth({ target }: { target: Target }) {
  const { upHoursByMonth, upSummary } = target.computed;
  if (upHoursByMonth.length === 0) return null;
  const longest = Math.max(...upHoursByMonth.map((month) => month.hoursPerNight), 1);
  return (
    <Block title={`Up${upSummary ? `: ${upSummary}` : ''}`}>
      <Box
        component="table"
        sx={{
          width: '100%',
          borderCollapse: 'collapse',
          fontSize: '0.875rem',
          '& th': { textAlign: 'left', fontWeight: 400, width: 90, py: 0.25 },
          '& .hours': { textAlign: 'right', width: 96, whiteSpace: 'nowrap' },
        }}
      >
        <thead>
          <tr>
            <th scope="col">
              <Explained
                explanation={{
                  title: 'Hours up',
                  meaning:
                    'Hours of a night in the middle of the month that the target stands above the altitude limit while the Sun is below −18°.',
                }}
              >
                Month
              </Explained>
            </th>
            <td aria-hidden="true" />
            <th scope="col" className="hours">
              hours a night
            </th>
          </tr>
        </thead>
        <tbody>
          {upHoursByMonth.map(({ month, hoursPerNight }) => (
            <tr key={month}>
              <th scope="row">{month}</th>
              <td aria-hidden="true">
                <Box
                  sx={{
                    height: 8,
                    borderRadius: '2px',
                    bgcolor: 'primary.main',
                    width: `${(100 * hoursPerNight) / longest}%`,
                  }}
                />
              </td>
              <td className="hours">{formatNumber(hoursPerNight, { decimals: 1 })}</td>
            </tr>
          ))}
        </tbody>
      </Box>
    </Block>
  );
}
