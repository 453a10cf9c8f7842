import { Semester, SemesterList, type SemesterInput, type SemesterPatch } from '@faintward/contracts/semesters';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api';

export const semesterQueries = {
  all: () => ['semesters'] as const,
  list: () =>
    queryOptions({
      queryKey: [...semesterQueries.all(), 'list'],
      queryFn: ({ signal }) => api({ path: '/semesters', schema: SemesterList, signal }),
    }),
  detail: (semesterId: string) =>
    queryOptions({
      queryKey: [...semesterQueries.all(), 'detail', semesterId],
      queryFn: ({ signal }) => api({ path: `/semesters/${semesterId}`, schema: Semester, signal }),
    }),
};

/** Stores a new semester, or the changes of one; the calls on the front page follow. */
export function useSaveSemester() {
  const queryClient = useQueryClient();
  const stored = () =>
    Promise.all([
      queryClient.invalidateQueries({ queryKey: semesterQueries.all() }),
      queryClient.invalidateQueries({ queryKey: ['calls'] }),
    ]);
  const create = useMutation({
    mutationFn: (body: SemesterInput) => api({ method: 'POST', path: '/semesters', body, schema: Semester }),
    onSuccess: stored,
  });
  const change = useMutation({
    mutationFn: ({ semesterId, version, patch }: { semesterId: string; version: number; patch: SemesterPatch }) =>
      api({ method: 'PATCH', path: `/semesters/${semesterId}`, body: patch, ifMatch: version, schema: Semester }),
    onSuccess: stored,
  });
  return { create, change };
}
