import type { BandId } from '@faintward/contracts/light';
import type { BandLight } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import ButtonBase from '@mui/material/ButtonBase';
import { useMemo } from 'react';
import { formatNumber, unknownMark } from '../../lib/format';
import { intoLanes } from '../plot/labels';
import { bandState } from './darkness';

const laneHeight = 36;
const leastWidth = 27;

/** Where each band lies along a plot of this extent, in lanes so that none covers another. */
export function placeBands(
  bands: readonly BandLight[],
  at: (nm: number) => number,
  left: number,
  right: number,
): { band: BandLight; from: number; width: number; lane: number }[] {
  const spans = bands.flatMap((band) => {
    const low = at(band.wavelengthLowNm);
    const high = at(band.wavelengthHighNm);
    if (!(high > left && low < right)) return [];
    const from = Math.max(left, low);
    const width = Math.max(leastWidth, Math.min(right, high) - from);
    return [{ item: band, from: Math.min(from, right - width), to: Math.min(from, right - width) + width }];
  });
  return intoLanes(spans, bands.length, 2).placed.map(({ item, from, to, lane }) => ({
    band: item,
    from,
    width: to - from,
    lane,
  }));
}

/** The bands over a spectrum: each a button with its letter and magnitude, as wide as it is. */
export function BandSpans({
  bands,
  at,
  left,
  right,
  chosen,
  onChoose,
}: {
  bands: readonly BandLight[];
  at: (nm: number) => number;
  left: number;
  right: number;
  chosen: BandId | null;
  onChoose: (bandId: BandId) => void;
}) {
  const placed = useMemo(() => placeBands(bands, at, left, right), [bands, at, left, right]);
  const laneCount = Math.max(0, ...placed.map((one) => one.lane + 1));
  return (
    <Box role="group" aria-label="Bands" sx={{ position: 'relative', height: laneCount * laneHeight + 4 }}>
      {placed.map(({ band, from, width, lane }) => (
        <ButtonBase
          key={band.bandId}
          aria-pressed={band.bandId === chosen}
          aria-label={`${band.label} ${bandState(band) === 'unknown' ? 'not known' : magnitudeText(band, width)}: light budget in this band`}
          onClick={() => onChoose(band.bandId)}
          title={band.reason?.message}
          sx={{
            position: 'absolute',
            left: from,
            width,
            top: lane * laneHeight,
            height: laneHeight - 4,
            flexDirection: 'column',
            font: 'inherit',
            fontSize: '0.6875rem',
            lineHeight: 1.15,
            border: 1,
            borderStyle: band.magnitudeAb === null ? 'dashed' : 'solid',
            borderColor: 'faintward.edge',
            borderRadius: '3px',
            color: band.magnitudeAb === null ? 'text.secondary' : 'text.primary',
            bgcolor: 'faintward.raised',
            '&:hover': { borderColor: 'text.primary' },
            '&[aria-pressed="true"]': { bgcolor: 'primary.main', color: 'primary.contrastText', borderStyle: 'solid' },
          }}
        >
          <Box component="span" sx={{ fontWeight: 600, fontSize: '0.75rem' }}>
            {band.label}
          </Box>
          <span>{magnitudeText(band, width)}</span>
        </ButtonBase>
      ))}
    </Box>
  );
}

function magnitudeText(band: BandLight, width: number): string {
  const state = bandState(band);
  if (state === 'unknown') return width >= 54 ? 'not known' : unknownMark;
  if (state === 'dark') return width >= 44 ? 'no light' : 'none';
  return formatNumber(band.magnitudeAb, { decimals: width >= 31 ? 2 : 1 });
}
