import type { RouteObject } from 'react-router-dom';
import { NotFoundPage } from '../ui/PageStates';
import { RequirePerson } from './RequirePerson';
import { Root } from './Root';
import { RouteError } from './RouteError';
import { paths } from './paths';

/**
 * The route table. Every page is loaded when it is first asked for; a page module exports `Component`
 * (and, where it starts its queries early, `loader`).
 */
export const routes: RouteObject[] = [
  {
    element: <Root />,
    errorElement: <RouteError />,
    // The first load draws the frame at once; the page's own skeleton follows.
    hydrateFallbackElement: <></>,
    children: [
      {
        errorElement: <RouteError />,
        children: [
          { path: paths.front.pattern, lazy: () => import('../routes/front.route') },
          { path: paths.signIn.pattern, lazy: () => import('../routes/sign-in.route') },
          { path: paths.signUp.pattern, lazy: () => import('../routes/sign-up.route') },
          { path: paths.forgottenPassword.pattern, lazy: () => import('../routes/forgotten-password.route') },
          { path: paths.resetPassword.pattern, lazy: () => import('../routes/reset-password.route') },
          { path: paths.mailbox.pattern, lazy: () => import('../routes/mailbox.route') },
          { path: paths.distances.pattern, lazy: () => import('../routes/distances.route') },
          { path: paths.source.pattern, lazy: () => import('../routes/source.route') },
          { path: paths.exposure.pattern, lazy: () => import('../routes/exposure.route') },
          { path: paths.sources.pattern, lazy: () => import('../routes/sources.route') },
          { path: paths.instruments.pattern, lazy: () => import('../routes/instruments.route') },
          {
            element: <RequirePerson />,
            children: [
              { path: paths.profile.pattern, lazy: () => import('../routes/profile.route') },
              // Investigators: the list, and one proposal with its sections inside the chain.
              { path: paths.proposals.pattern, lazy: () => import('../routes/proposals.route') },
              { path: paths.newProposal.pattern, lazy: () => import('../routes/new-proposal.route') },
              {
                path: paths.proposal.pattern,
                lazy: () => import('../routes/proposal.route'),
                children: [
                  { index: true, lazy: () => import('../routes/proposal-index.route') },
                  { path: 'targets', lazy: () => import('../routes/proposal-targets.route') },
                  { path: 'exposures', lazy: () => import('../routes/proposal-exposures.route') },
                  { path: 'time', lazy: () => import('../routes/proposal-time.route') },
                  { path: 'cosmologies', lazy: () => import('../routes/proposal-cosmologies.route') },
                  { path: 'case', lazy: () => import('../routes/proposal-case.route') },
                  { path: 'team', lazy: () => import('../routes/proposal-team.route') },
                  { path: 'submit', lazy: () => import('../routes/proposal-submit.route') },
                  { path: 'history', lazy: () => import('../routes/proposal-history.route') },
                ],
              },
              { path: paths.target.pattern, lazy: () => import('../routes/target.route') },
              // Committee.
              { path: paths.reviews.pattern, lazy: () => import('../routes/reviews.route') },
              { path: paths.review.pattern, lazy: () => import('../routes/review.route') },
              { path: paths.panels.pattern, lazy: () => import('../routes/panels.route') },
              { path: paths.panel.pattern, lazy: () => import('../routes/panel.route') },
              { path: paths.ranking.pattern, lazy: () => import('../routes/ranking.route') },
            ],
          },
          {
            element: <RequirePerson may={(me) => me.isStaff} />,
            children: [
              { path: paths.semesters.pattern, lazy: () => import('../routes/semesters.route') },
              { path: paths.newSemester.pattern, lazy: () => import('../routes/new-semester.route') },
              { path: paths.semesterEdit.pattern, lazy: () => import('../routes/semester-edit.route') },
              { path: paths.newConfiguration.pattern, lazy: () => import('../routes/new-configuration.route') },
              { path: paths.semester.pattern, lazy: () => import('../routes/semester.route') },
            ],
          },
          {
            element: <RequirePerson may={(me) => me.isAdministrator} />,
            children: [
              { path: paths.administration.pattern, lazy: () => import('../routes/administration.route') },
              { path: paths.administrationPeople.pattern, lazy: () => import('../routes/administration-people.route') },
              { path: paths.administrationMail.pattern, lazy: () => import('../routes/administration-mail.route') },
              {
                path: paths.administrationChanges.pattern,
                lazy: () => import('../routes/administration-changes.route'),
              },
            ],
          },
          { path: '*', element: <NotFoundPage /> },
        ],
      },
    ],
  },
];
