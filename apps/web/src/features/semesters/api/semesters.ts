import { Semester, SemesterList } from '@faintward/contracts/semesters';
import { queryOptions } from '@tanstack/react-query';
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
