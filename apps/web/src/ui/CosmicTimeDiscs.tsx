import Box from '@mui/material/Box';
import ButtonBase from '@mui/material/ButtonBase';
import Paper from '@mui/material/Paper';
import Popper from '@mui/material/Popper';
import { useId, useRef, useState, type KeyboardEvent } from 'react';
import { formatNumber } from '../lib/format';
import type { CosmicTimePoint } from './CosmicTimeStrip';
import { RedshiftValue } from './RedshiftValue';

export interface PlacedDisc {
  point: CosmicTimePoint;
  x: number;
  y: number;
  radius: number;
}

/** Smallest edge of what is pointed at, however small the disc. */
const leastTarget = 24;

/**
 * The discs of cosmic time as buttons over their picture: one stop of the tab key, then the arrow keys from the earliest
 * to the latest. Each says what it is.
 */
export function CosmicTimeDiscs({
  discs,
  onChoose,
}: {
  /** The earliest first. */
  discs: readonly PlacedDisc[];
  onChoose?: (targetId: string) => void;
}) {
  const [current, setCurrent] = useState(0);
  const [shown, setShown] = useState<{ index: number; anchor: HTMLElement } | null>(null);
  const list = useRef<HTMLUListElement>(null);
  const id = useId();
  const stop = Math.min(current, discs.length - 1);
  const point = shown ? discs[shown.index]?.point : undefined;

  function onKeyDown(event: KeyboardEvent) {
    if (event.key === 'Escape') setShown(null);
    const to = {
      ArrowRight: stop + 1,
      ArrowDown: stop + 1,
      ArrowLeft: stop - 1,
      ArrowUp: stop - 1,
      Home: 0,
      End: discs.length - 1,
    }[event.key];
    if (to === undefined || !discs[to]) return;
    event.preventDefault();
    list.current?.querySelectorAll('button')[to]?.focus();
  }

  return (
    <Box
      component="ul"
      ref={list}
      aria-label="Targets, the earliest light first"
      onKeyDown={onKeyDown}
      sx={{ listStyle: 'none', m: 0, p: 0, position: 'absolute', inset: 0, pointerEvents: 'none' }}
    >
      {discs.map((disc, index) => {
        const size = Math.max(leastTarget, 2 * disc.radius + 4);
        return (
          <li key={disc.point.targetId}>
            <ButtonBase
              tabIndex={index === stop ? 0 : -1}
              aria-describedby={shown?.index === index ? id : undefined}
              aria-label={`${disc.point.name}, z ${formatNumber(disc.point.redshift, { decimals: 3 })}`}
              onFocus={(event) => {
                setCurrent(index);
                setShown({ index, anchor: event.currentTarget });
              }}
              onBlur={() => setShown(null)}
              onPointerEnter={(event) => setShown({ index, anchor: event.currentTarget })}
              onPointerLeave={() => setShown(null)}
              onClick={() => onChoose?.(disc.point.targetId)}
              sx={{
                position: 'absolute',
                pointerEvents: 'auto',
                left: disc.x - size / 2,
                top: disc.y - size / 2,
                width: size,
                height: size,
                borderRadius: '50%',
                cursor: onChoose ? 'pointer' : 'default',
                // The smaller disc is pointed at where two overlap.
                zIndex: Math.round(20 - disc.radius),
              }}
            />
          </li>
        );
      })}
      {shown && point && (
        <Popper id={id} open anchorEl={shown.anchor} placement="top" sx={{ zIndex: 'tooltip', pointerEvents: 'none' }}>
          <Paper
            sx={{ border: '1px solid var(--fw-palette-faintward-edge)', px: 1.25, py: 0.75, fontSize: '0.8125rem' }}
          >
            <strong>{point.name}</strong>
            <br />
            <RedshiftValue redshift={point.redshift} /> · {formatNumber(point.ageGyr, { significant: 3 })} Gyr
            {point.hours !== null && <> · {formatNumber(point.hours, { decimals: 1 })} h</>}
          </Paper>
        </Popper>
      )}
    </Box>
  );
}
