import { formatDeclination, formatRightAscension } from '@faintward/astronomy';
import type { Notice } from '@faintward/contracts/common';
import type { Target } from '@faintward/contracts/targets';
import type { targets } from '../../database/schema/targets.js';
import { formatBrightness } from './brightness-format.js';
import { formatRedshiftUncertainty } from './redshift-uncertainty-text.js';

export interface TargetWithSums {
  target: typeof targets.$inferSelect;
  observationCount: number;
  requestedSeconds: number | null;
}

export function toTarget({ target, observationCount, requestedSeconds }: TargetWithSums): Target {
  return {
    targetId: target.id,
    position: target.position,
    name: target.name,
    rightAscensionDeg: target.rightAscensionDeg,
    declinationDeg: target.declinationDeg,
    rightAscensionText: formatRightAscension(target.rightAscensionDeg),
    declinationText: formatDeclination(target.declinationDeg),
    redshift: target.redshift,
    redshiftUncertainty: target.redshiftUncertainty,
    redshiftUncertaintyText: formatRedshiftUncertainty(target.redshiftUncertainty, target.redshift),
    redshiftKind: target.redshiftKind,
    light: target.light,
    brightnessText: formatBrightness(target.light),
    extent: target.extent,
    notes: target.notes,
    computed: {
      ...target.computed,
      notices: [...target.computed.notices, ...duplicateNotices(target.nearestDuplicateName)],
    },
    observationCount,
    requestedSeconds,
    version: target.version,
    updatedAt: target.updatedAt.toISOString(),
  };
}

function duplicateNotices(nearestName: string | null): Notice[] {
  if (nearestName === null) return [];
  return [
    {
      code: 'duplicate',
      message: `Another target of this list, ${nearestName}, is within 2″ of this place.`,
      severity: 'warning',
      field: 'rightAscensionDeg',
    },
  ];
}
