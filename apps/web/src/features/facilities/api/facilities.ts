import { ModeConfigurationVersion, type NewModeConfiguration } from '@faintward/contracts/facilities';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api';
import { facilityQueries } from '../../../lib/queries/facilities';

/** Puts a new configuration of a mode in force. Whatever was estimated with the mode may be computed anew. */
export function useAddConfiguration(modeId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: NewModeConfiguration) =>
      api({ method: 'POST', path: `/modes/${modeId}/configurations`, body, schema: ModeConfigurationVersion }),
    onSuccess: () =>
      Promise.all([
        queryClient.invalidateQueries({ queryKey: facilityQueries.telescopes().queryKey }),
        queryClient.invalidateQueries({ queryKey: facilityQueries.configurations(modeId).queryKey }),
      ]),
  });
}
