import { roleMay, ROLES, type Role } from '@riseback/contracts';
import type { Route } from '../../server/src/platform/routes/route-table';

/** Somebody whom the route's rule lets in: an administrator wherever that will do. */
export function rightfulOf({ rule }: Route): Role {
  const able = (role: Role) => !('anyOf' in rule) || rule.anyOf.some((permission) => roleMay(role, permission));
  return able('administrator') ? 'administrator' : (ROLES.find(able) ?? 'viewer');
}
