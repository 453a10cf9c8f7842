import { escapeHtml } from '../../platform/mail/escape-html.js';

export interface ReceiptFacts {
  label: string;
  title: string;
  number: number;
  submittedAt: string;
  deadlineAt: string;
  fingerprint: string;
  targetCount: number;
  totalHours: number;
  link: string;
}

/** The letter that says what was received, with the fingerprint by which it can be proved. */
export function receiptMail(facts: ReceiptFacts) {
  const { label, title, number, submittedAt, deadlineAt, fingerprint, targetCount, totalHours, link } = facts;
  const received = `Proposal ${label}, "${title}", was received on ${submittedAt} as its submission number ${number}.`;
  const asks = `It asks for ${totalHours.toFixed(1)} hours on ${targetCount} ${targetCount === 1 ? 'target' : 'targets'}.`;
  const until = `Until the deadline, ${deadlineAt}, it can be changed and submitted again; the committee reads the last submission.`;
  return {
    subject: `Received: proposal ${label}`,
    text: [
      received,
      asks,
      '',
      `Fingerprint (SHA-256) of what was submitted: ${fingerprint}`,
      '',
      until,
      '',
      link,
      '',
      'Faintward',
    ].join('\n'),
    html: [
      '<!doctype html><html lang="en"><body style="font-family:Georgia,serif;color:#22262a;max-width:36em">',
      `<p>${escapeHtml(received)} ${escapeHtml(asks)}</p>`,
      `<p>Fingerprint (SHA-256) of what was submitted:<br><code>${escapeHtml(fingerprint)}</code></p>`,
      `<p>${escapeHtml(until)}</p>`,
      `<p><a href="${escapeHtml(link)}">Open the proposal</a></p>`,
      '<p>Faintward</p>',
      '</body></html>',
    ].join('\n'),
  };
}
