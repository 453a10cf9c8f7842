import { applyDecorators, SetMetadata } from '@nestjs/common';
import { ApiCookieAuth, ApiExtension } from '@nestjs/swagger';
import type { Permission } from '@faintward/contracts/permissions';

export const ACCESS_RULE = 'faintward:access';

export type AccessRule = { kind: 'public' } | { kind: 'signed-in' } | { kind: 'permission'; permission: Permission };

/**
 * Where a permission is decided. Those of a person are decided by the guard, before the route runs; those of an object
 * (this proposal, that panel) by the service that owns the object, on ids, so that a second caller cannot forget it.
 */
export const DECIDED_ON = {
  'proposal.create': 'person',
  'proposal.read': 'object',
  'proposal.edit': 'object',
  'proposal.edit-targets': 'object',
  'proposal.manage-team': 'object',
  'proposal.submit': 'object',
  'submission.read': 'object',
  'review.read': 'object',
  'review.write': 'object',
  'panel.read': 'object',
  'panel.assign': 'object',
  'panel.rank': 'object',
  'panel.award': 'object',
  'semester.manage': 'staff',
  'facility.manage': 'staff',
  'people.search': 'person',
  'people.manage': 'administrator',
  'audit.read': 'administrator',
  'mail.read': 'administrator',
} satisfies Record<Permission, 'person' | 'object' | 'staff' | 'administrator'>;

/** Open to everybody, signed in or not. */
export const Public = () => SetMetadata(ACCESS_RULE, { kind: 'public' } satisfies AccessRule);

/** Open to every signed-in person, for what is their own. */
export const SignedIn = () =>
  applyDecorators(SetMetadata(ACCESS_RULE, { kind: 'signed-in' } satisfies AccessRule), ApiCookieAuth('session'));

/**
 * Needs a named permission. For one that is decided on an object this names it for readers, for the documentation and for
 * the test that walks the routes; the service makes the decision.
 */
export const Requires = (permission: Permission) =>
  applyDecorators(
    SetMetadata(ACCESS_RULE, { kind: 'permission', permission } satisfies AccessRule),
    ApiCookieAuth('session'),
    ApiExtension('x-permission', permission),
  );
