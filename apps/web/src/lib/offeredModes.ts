import type { Telescope } from '@faintward/contracts/facilities';

/** Every mode that may be asked for, with its instrument and telescope; `keptModeId` also where it is not offered any more. */
export function offeredModes(telescopes: readonly Telescope[], keptModeId?: string) {
  return telescopes.flatMap((telescope) =>
    telescope.instruments.flatMap((instrument) =>
      instrument.modes
        .filter((mode) => (instrument.isOffered && mode.isOffered) || mode.modeId === keptModeId)
        .map((mode) => ({ telescope, instrument, mode })),
    ),
  );
}
export type OfferedMode = ReturnType<typeof offeredModes>[number];
