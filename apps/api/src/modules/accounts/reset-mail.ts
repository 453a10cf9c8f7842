import { escapeHtml } from '../../platform/mail/escape-html.js';

/** The letter with the link to a new password. */
export function resetMail(facts: { givenName: string; link: string; minutes: number }) {
  const { givenName, link, minutes } = facts;
  return {
    subject: 'A new password for Faintward',
    text: [
      `Dear ${givenName},`,
      '',
      'somebody, most likely you, asked for a new Faintward password. Choose one here:',
      '',
      link,
      '',
      `The link works once and for ${minutes} minutes. If you did not ask for it, there is nothing to do: your password stays as it is.`,
      '',
      'Faintward',
    ].join('\n'),
    html: [
      '<!doctype html><html lang="en"><body style="font-family:Georgia,serif;color:#22262a;max-width:36em">',
      `<p>Dear ${escapeHtml(givenName)},</p>`,
      '<p>somebody, most likely you, asked for a new Faintward password.</p>',
      `<p><a href="${escapeHtml(link)}">Choose a new password</a></p>`,
      `<p>The link works once and for ${minutes} minutes. If you did not ask for it, there is nothing to do: your password stays as it is.</p>`,
      '<p>Faintward</p>',
      '</body></html>',
    ].join('\n'),
  };
}
