import { z } from 'zod';
import { Id, Instant, line } from './common.js';
import { PanelRole } from './permissions.js';

export const Email = z
  .string()
  .trim()
  .max(254)
  .pipe(z.email({ error: 'Please give an e-mail address, such as name@institute.example.' }))
  .transform((email) => email.toLowerCase());

/** Length is what resists guessing; composition rules only make passwords predictable. */
export const NewPassword = z
  .string()
  .min(12, { error: 'At least 12 characters.' })
  .max(200, { error: 'At most 200 characters.' });

export const SignUpRequest = z
  .object({
    email: Email,
    password: NewPassword,
    givenName: line(100),
    familyName: line(100),
    institutionId: Id.nullable().default(null),
  })
  .meta({ id: 'SignUpRequest' });
export type SignUpRequest = z.output<typeof SignUpRequest>;

export const SignInRequest = z
  .object({ email: Email, password: z.string().min(1).max(200) })
  .meta({ id: 'SignInRequest' });
export type SignInRequest = z.output<typeof SignInRequest>;

/** The signed-in person, with what decides which parts of the product concern them. */
export const Me = z
  .object({
    personId: Id,
    email: z.string(),
    givenName: z.string(),
    familyName: z.string(),
    institution: z.object({ institutionId: Id, name: z.string() }).nullable(),
    orcid: z.string().nullable(),
    isStaff: z.boolean(),
    isAdministrator: z.boolean(),
    panels: z.array(
      z.object({ panelId: Id, panelName: z.string(), semesterId: Id, semesterName: z.string(), role: PanelRole }),
    ),
  })
  .meta({ id: 'Me' });
export type Me = z.infer<typeof Me>;

export const ProfilePatch = z
  .object({
    givenName: line(100),
    familyName: line(100),
    institutionId: Id.nullable(),
    orcid: z
      .string()
      .trim()
      .regex(/^\d{4}-\d{4}-\d{4}-\d{3}[\dX]$/, { error: 'An ORCID iD looks like 0000-0002-1825-0097.' })
      .refine(hasValidOrcidChecksum, { error: 'The check digit of this ORCID iD does not fit: is a digit mistyped?' })
      .nullable(),
  })
  .partial()
  .meta({ id: 'ProfilePatch' });
export type ProfilePatch = z.output<typeof ProfilePatch>;

/** ISO 7064 MOD 11-2, as ORCID defines it for its identifiers. */
function hasValidOrcidChecksum(orcid: string): boolean {
  const digits = orcid.replaceAll('-', '');
  let total = 0;
  for (const digit of digits.slice(0, 15)) total = (total + Number(digit)) * 2;
  const remainder = (12 - (total % 11)) % 11;
  return digits[15] === (remainder === 10 ? 'X' : String(remainder));
}

export const PasswordChange = z
  .object({ currentPassword: z.string().min(1).max(200), newPassword: NewPassword })
  .meta({ id: 'PasswordChange' });
export type PasswordChange = z.output<typeof PasswordChange>;

export const PasswordResetRequest = z.object({ email: Email }).meta({ id: 'PasswordResetRequest' });
export type PasswordResetRequest = z.output<typeof PasswordResetRequest>;

export const PasswordReset = z.object({ password: NewPassword }).meta({ id: 'PasswordReset' });
export type PasswordReset = z.output<typeof PasswordReset>;

/** A person of the demo scenario who can be signed in with one click. Only answered in demo mode. */
export const DemoPerson = z
  .object({
    email: z.string(),
    name: z.string(),
    institutionName: z.string().nullable(),
    /** What this person does here, in a few words: "principal investigator of two drafts". */
    part: z.string(),
  })
  .meta({ id: 'DemoPerson' });
export type DemoPerson = z.infer<typeof DemoPerson>;

export const DemoPeople = z.object({ people: z.array(DemoPerson), password: z.string() }).meta({ id: 'DemoPeople' });
export type DemoPeople = z.infer<typeof DemoPeople>;

/** A message that the local mail fake caught. */
export const MailboxMessage = z
  .object({
    messageId: z.string(),
    receivedAt: Instant,
    to: z.string(),
    subject: z.string(),
    text: z.string(),
  })
  .meta({ id: 'MailboxMessage' });
export type MailboxMessage = z.infer<typeof MailboxMessage>;

/**
 * Cookie that tells the web whether asking who is signed in can be of use. It carries no secret and gives no right: without it
 * every visitor's first page would begin with two refused requests.
 */
export const SESSION_HINT_COOKIE = 'faintward_here';
