import { DomainError, invalidField } from '../../platform/domain-error.js';

/** Signing up tells that an address is taken: the person standing there needs to know. Asking for a reset does not tell. */
export function emailTaken(): DomainError {
  const message = 'There is an account with this e-mail address already. Sign in, or ask for a new password.';
  return new DomainError('already-exists', message, { fieldErrors: [{ path: 'email', message }] });
}

export function wrongCredentials(): DomainError {
  return new DomainError('wrong-credentials', 'E-mail address or password is wrong.');
}

export function sessionEnded(): DomainError {
  return new DomainError('session-expired', 'Your session has ended. Please sign in again.');
}

export function linkExpired(): DomainError {
  return new DomainError('link-expired', 'This link was used already or is older than an hour. Ask for a new one.');
}

export function unknownInstitution(): DomainError {
  return invalidField('institutionId', 'There is no such institution.');
}

export function wrongCurrentPassword(): DomainError {
  return invalidField('currentPassword', 'This is not your current password.');
}
