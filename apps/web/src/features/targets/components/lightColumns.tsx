import type { BandId } from '@faintward/contracts/light';
import type { Target } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import Tooltip from '@mui/material/Tooltip';
import type { ReactNode } from 'react';
import { formatNumber, unknownMark } from '../../../lib/format';
import type { TableColumn } from '../../../ui/DataTable';
import { visuallyHidden } from '../../../ui/visuallyHidden';
import type { TargetRow } from './targetColumns';

/** Bands that the table has columns for. */
export const shownBands = ['g', 'r', 'i', 'z', 'Y', 'J', 'H', 'Ks'] as const satisfies readonly BandId[];
type ShownBand = (typeof shownBands)[number];
export const bandField = (band: ShownBand) => `band-${band}`;

/** What of a target's light arrives. */
export function lightColumns(): TableColumn<TargetRow>[] {
  const computed = (
    column: Pick<TableColumn<TargetRow>, 'field' | 'headerName' | 'width' | 'sortable' | 'unit'>,
    read: (target: Target) => number | null | undefined,
    draw: (target: Target) => ReactNode,
  ): TableColumn<TargetRow> => ({
    sortable: false,
    ...column,
    computed: true,
    numeric: true,
    valueGetter: (_value, row) => read(row.target) ?? null,
    renderCell: ({ row }) => draw(row.target),
  });
  return [
    computed(
      { field: 'apparentMagnitudeAb', headerName: 'm', unit: 'AB', width: 92, sortable: true },
      (target) => target.computed.apparentMagnitudeAb,
      (target) => <Magnitude target={target} />,
    ),
    computed(
      { field: 'lineFluxErgSCm2', headerName: 'Line flux', unit: 'erg/s/cm²', width: 104 },
      (target) => target.computed.lineFluxErgSCm2,
      (target) => formatNumber(target.computed.lineFluxErgSCm2, { significant: 3 }),
    ),
    computed(
      { field: 'lineObservedWavelengthNm', headerName: 'Line at', unit: 'nm, observed', width: 88 },
      (target) => target.computed.lineObservedWavelengthNm,
      (target) => formatNumber(target.computed.lineObservedWavelengthNm, { decimals: 2 }),
    ),
    computed(
      { field: 'surfaceBrightness', headerName: '⟨μ⟩', unit: 'AB/″²', width: 68 },
      (target) => target.computed.surfaceBrightnessAbMagPerArcsec2,
      (target) => formatNumber(target.computed.surfaceBrightnessAbMagPerArcsec2, { decimals: 2 }),
    ),
    ...shownBands.map((band) =>
      computed(
        { field: bandField(band), headerName: band, unit: 'AB', width: 72 },
        (target) => target.computed.bandMagnitudesAb[band],
        (target) => <BandMagnitude target={target} band={band} />,
      ),
    ),
  ];
}

function Magnitude({ target }: { target: Target }) {
  const { apparentMagnitudeAb, magnitudeLabel } = target.computed;
  const sigma = target.light?.sigmaMag;
  return (
    <span title={magnitudeLabel ?? undefined}>
      {formatNumber(apparentMagnitudeAb, { decimals: 2 })}
      {apparentMagnitudeAb !== null && sigma !== undefined && sigma > 0 && (
        <Box component="span" sx={{ color: 'text.secondary' }}>
          {' '}
          ± {formatNumber(sigma, { decimals: 2 })}
        </Box>
      )}
    </span>
  );
}

/** A magnitude, or in words that the band has none: a regime without light is no faint one. */
function BandMagnitude({ target, band }: { target: Target; band: ShownBand }) {
  const magnitude = target.computed.bandMagnitudesAb[band];
  if (magnitude != null) return formatNumber(magnitude, { decimals: 2 });
  const reason = whyNoMagnitude(target, band);
  return (
    <Tooltip title={reason} describeChild>
      <Box component="span" sx={{ color: 'text.secondary', fontStyle: magnitude === null ? 'italic' : undefined }}>
        {magnitude === null ? 'no light' : unknownMark}
        <span style={visuallyHidden}>. {reason}</span>
      </Box>
    </Tooltip>
  );
}

function whyNoMagnitude({ light, extent, computed }: Target, band: ShownBand): string {
  if (light === null) return 'Nothing is known of its light yet.';
  if (computed.bandMagnitudesAb[band] === null) {
    return `None of its light arrives in ${band}: it is absorbed on the way, or its spectrum says nothing there. The target sheet names which.`;
  }
  if (light.kind === 'lineFlux' || light.kind === 'lineLuminosity') return 'A line has no magnitude in a band.';
  if (extent.kind === 'uniform') return 'An even surface has a magnitude per square arcsecond only.';
  return 'Not worked out.';
}
