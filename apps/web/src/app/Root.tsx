import { useQuery, useQueryClient } from '@tanstack/react-query';
import { Suspense, useMemo } from 'react';
import { Outlet, useNavigate, useNavigation } from 'react-router-dom';
import Box from '@mui/material/Box';
import LinearProgress from '@mui/material/LinearProgress';
import { Acknowledgement } from '@faintward/contracts/common';
import type { Me } from '@faintward/contracts/accounts';
import { z } from 'zod';
import { api } from '../lib/api';
import { sessionQueries } from '../lib/queries/session';
import { setHadPerson } from '../lib/session';
import { AppShell, type ShellSection } from '../ui/AppShell';
import { useNotices } from '../ui/Notices';
import { problemMessage } from '../ui/ProblemDisplay';
import { paths } from './paths';
import { SignInAgain } from './SignInAgain';

const personLinks: ShellSection[] = [
  { label: 'Profile', to: paths.profile.to() },
  { label: 'Distances and dimming', to: paths.distances.to() },
  { label: 'The light of a source', to: paths.source.to() },
  { label: 'Exposure sketchpad', to: paths.exposure.to() },
];

/** The frame around every page. Pages load inside it, so that it never flickers. */
export function Root() {
  const me = useQuery(sessionQueries.me()).data;
  const calls = useQuery(sessionQueries.calls()).data;
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const navigation = useNavigation();
  const announce = useNotices();
  const sections = useMemo(() => sectionsOf(me), [me]);
  const call = calls?.calls.find((one) => one.stage === 'open');

  async function signOut() {
    try {
      await api({
        method: 'DELETE',
        path: '/session',
        schema: z.union([Acknowledgement, z.undefined()]),
        onSignedOut: 'throw',
      });
    } catch (error) {
      announce(`Not signed out: ${problemMessage(error)}`);
      return;
    }
    setHadPerson(false);
    await navigate(paths.front.to());
    queryClient.clear();
    await queryClient.invalidateQueries();
  }

  return (
    <AppShell
      sections={sections}
      person={me ? { name: `${me.givenName} ${me.familyName}`, email: me.email } : undefined}
      personLinks={personLinks}
      signInPath={paths.signIn.to()}
      onSignOut={() => void signOut()}
      deadline={call ? { at: call.deadlineAt, siteTimeZone: call.siteTimeZone } : undefined}
    >
      {navigation.state === 'loading' && (
        <LinearProgress aria-label="Loading the page" sx={{ position: 'absolute', left: 0, right: 0 }} />
      )}
      <Suspense fallback={<Box sx={{ minHeight: '60vh' }} aria-busy="true" />}>
        <Outlet />
      </Suspense>
      <SignInAgain email={me?.email} />
    </AppShell>
  );
}

/** The sections of the top bar that concern this person. */
export function sectionsOf(me: Me | null | undefined): ShellSection[] {
  if (!me) {
    return [
      { label: 'Distances', to: paths.distances.to() },
      { label: 'Exposure', to: paths.exposure.to() },
      { label: 'Instruments', to: paths.instruments.to() },
    ];
  }
  const chaired = me.panels.filter((panel) => panel.role === 'chair');
  return [
    { label: 'Proposals', to: paths.proposals.to() },
    ...(me.panels.length > 0 ? [{ label: 'Reviews', to: paths.reviews.to() }] : []),
    ...rankingSection(chaired),
    { label: 'Instruments', to: paths.instruments.to() },
    ...(me.isStaff ? [{ label: 'Semesters', to: paths.semesters.to() }] : []),
    ...(me.isAdministrator ? [{ label: 'Administration', to: paths.administration.to() }] : []),
  ];
}

/** One panel: straight to its ranking. Several: to the list that names them, by semester. */
function rankingSection(chaired: Me['panels']): ShellSection[] {
  const [first, second] = chaired;
  if (!first) return [];
  return [{ label: 'Ranking', to: second ? paths.panels.to() : paths.ranking.to(first.panelId) }];
}
