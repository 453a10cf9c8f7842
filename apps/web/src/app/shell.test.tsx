import { useMutation } from '@tanstack/react-query';
import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { api } from '../lib/api';
import { LeaveGuard } from '../ui/form/LeaveGuard';
import { calls, id, me } from '../testing/examples';
import { renderRoute } from '../testing/renderRoute';
import { answerWith, problem } from '../testing/server';
import { paths, safeNext } from './paths';
import { Root, sectionsOf } from './Root';

/** A page with something typed on it and a request behind its button. */
function Page() {
  const [text, setText] = useState('');
  const save = useMutation({
    mutationFn: () => api({ method: 'PUT', path: '/note', body: { text }, schema: z.object({ text: z.string() }) }),
  });
  return (
    <>
      <input aria-label="Note" value={text} onChange={(event) => setText(event.target.value)} />
      <button onClick={() => save.mutate()}>Save</button>
      {save.data && <p>Stored: {save.data.text}</p>}
      {save.error && <p>Failed</p>}
      <LeaveGuard when={text !== '' && !save.data} />
    </>
  );
}
const table = [
  {
    element: <Root />,
    children: [
      { path: '/page', element: <Page /> },
      { path: '*', element: <p>Elsewhere</p> },
    ],
  },
];

describe('a session that ends while something is being typed', () => {
  it('asks to sign in on top of the page, keeps the text and stores it', async () => {
    const { handlers } = answerWith({
      'GET /session': { body: me },
      'GET /calls': { body: calls },
      'PUT /note': problem(401, 'session-expired'),
      'POST /session/refresh': problem(401, 'session-expired'),
    });
    renderRoute('/page', table);
    await screen.findByRole('button', { name: /M\. Orlandi/ });
    await userEvent.type(screen.getByLabelText('Note'), 'long thoughts');
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));

    const dialog = await screen.findByRole('dialog', { name: 'Your session has ended' }, { timeout: 10_000 });
    expect(dialog).toBeVisible();
    expect(screen.getByLabelText('E-mail')).toHaveValue(me.email);
    handlers['PUT /note'] = (request) => ({ body: request.body });
    handlers['POST /session'] = { body: me };
    await userEvent.type(screen.getByLabelText('Password'), 'my password');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    expect(await screen.findByText('Stored: long thoughts')).toBeInTheDocument();
    await waitFor(() => expect(screen.queryByRole('dialog')).not.toBeInTheDocument());
    expect(screen.getByLabelText('Note')).toHaveValue('long thoughts');
  });
});

describe('the frame', () => {
  it('asks before a page with unsaved changes is left, and stays if told to', async () => {
    answerWith({ 'GET /session': { body: me }, 'GET /calls': { body: calls } });
    const { router } = renderRoute('/page', table);
    await userEvent.type(await screen.findByLabelText('Note'), 'x');
    await userEvent.click(await screen.findByRole('link', { name: 'Instruments' }));
    expect(await screen.findByRole('dialog', { name: 'Leave without saving?' })).toBeVisible();
    await userEvent.click(screen.getByRole('button', { name: 'Stay' }));
    expect(router.state.location.pathname).toBe('/page');
    await waitFor(() => expect(screen.queryByRole('dialog')).not.toBeInTheDocument());
    await userEvent.click(screen.getByRole('link', { name: 'Instruments' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Leave' }));
    expect(await screen.findByText('Elsewhere')).toBeInTheDocument();
  });

  it('shows the deadline of the open call and keeps the chosen theme', async () => {
    answerWith({ 'GET /session': problem(401, 'not-signed-in'), 'GET /calls': { body: calls } });
    renderRoute('/x', table);
    expect(await screen.findByText(/2099-03-31 18:00 UTC · 15:00 site/)).toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'Theme' }));
    await userEvent.click(await screen.findByRole('menuitemradio', { name: /Dome/ }));
    await waitFor(() => expect(document.documentElement).toHaveAttribute('data-theme', 'dome'));
    expect(localStorage.getItem('faintward-mode')).toBe('dark');
    expect(localStorage.getItem('faintward-scheme-dark')).toBe('dome');
  });
});

describe('sections', () => {
  const labels = (person: typeof me | null) => sectionsOf(person).map((section) => section.label);
  it('are those that concern the person', () => {
    expect(labels(me)).toEqual(['Proposals', 'Reviews', 'Ranking', 'Instruments', 'Semesters', 'Administration']);
    expect(labels({ ...me, isStaff: false, isAdministrator: false, panels: [] })).toEqual(['Proposals', 'Instruments']);
    expect(
      labels({ ...me, isStaff: false, isAdministrator: false, panels: [{ ...me.panels[0]!, role: 'member' }] }),
    ).toEqual(['Proposals', 'Reviews', 'Instruments']);
    expect(labels(null)).toEqual(['Distances', 'Exposure', 'Instruments']);
  });
  it('lead a chair to their panel', () => {
    expect(sectionsOf(me).find((section) => section.label === 'Ranking')?.to).toBe(paths.ranking.to(id(4)));
  });
});

it.each(['//evil.example', 'https://evil.example', '/\\evil.example', '', null])(
  '%s is no place to go next',
  (next) => {
    expect(safeNext(next)).toBeUndefined();
  },
);
