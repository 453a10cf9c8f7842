import MenuItem from '@mui/material/MenuItem';
import TextField from '@mui/material/TextField';
import { useQuery } from '@tanstack/react-query';
import { formatNumber } from '../../lib/format';
import { parseNumber } from '../form/parseNumber';
import { DraftChoice, DraftField, type DraftProps } from './DraftFields';
import { numberText, type LightDraft } from './lightDraft';
import { lightQueries } from './lightQueries';

/** Where a list of lines is asked for while no redshift is typed; only their rest wavelengths are of use then. */
const anyRedshift = 2;
/** Closer than this, in nm, a typed wavelength is that of the line. */
const sameLineNm = 0.005;

/** Which line, how wide, and the continuum under it. */
export function LineFields({ redshift, ...props }: DraftProps<LightDraft> & { redshift: number | undefined }) {
  const { draft, disabled = false, onChange } = props;
  const lines = useQuery(lightQueries.lines(redshift ?? anyRedshift));
  const wavelengthNm = parseNumber(draft.restLine);
  const chosen = lines.data?.find(
    (line) => typeof wavelengthNm === 'number' && Math.abs(line.restWavelengthNm - wavelengthNm) < sameLineNm,
  );
  const observedText =
    chosen && redshift !== undefined && !lines.isPlaceholderData
      ? `observed at ${formatNumber(chosen.observedWavelengthNm, { significant: 5 })} nm`
      : undefined;
  const helperText = lines.error
    ? 'The lines could not be loaded: give the wavelength.'
    : lines.data
      ? observedText
      : 'Loading the lines…';
  return (
    <>
      <TextField
        select
        label="Line"
        value={chosen?.lineId ?? ''}
        disabled={disabled || !lines.data}
        onChange={(event) => {
          const line = lines.data?.find((one) => one.lineId === event.target.value);
          if (line) onChange({ restLine: numberText(line.restWavelengthNm) });
        }}
        helperText={helperText}
        sx={{ gridColumn: '1 / -1' }}
        slotProps={{ select: { displayEmpty: true }, inputLabel: { shrink: true } }}
      >
        <MenuItem value="" disabled={chosen !== undefined}>
          another, by its wavelength
        </MenuItem>
        {lines.data?.map((line) => (
          <MenuItem key={line.lineId} value={line.lineId}>
            {line.label}, {formatNumber(line.restWavelengthNm, { significant: 6 })} nm
          </MenuItem>
        ))}
      </TextField>
      <DraftField {...props} name="restLine" label="Rest wavelength" unit="nm" hint="in vacuum" />
      <DraftField {...props} name="width" label="Velocity width" unit="km/s" hint="full width at half maximum" />
      <DraftChoice
        {...props}
        name="continuum"
        label="Continuum under it"
        hint="adds noise, not signal"
        options={[
          ['none', 'none'],
          ['magnitude', 'a magnitude'],
          ['equivalentWidth', 'an equivalent width'],
        ]}
      />
      {draft.continuum === 'magnitude' && (
        <DraftField {...props} name="continuumMagnitude" label="Continuum" unit="AB" />
      )}
      {draft.continuum === 'equivalentWidth' && (
        <DraftField {...props} name="continuumWidth" label="Equivalent width" unit="nm" hint="in the rest frame" />
      )}
    </>
  );
}
