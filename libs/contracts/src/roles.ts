import * as z from 'zod';

/** Roles are given per site; a person has one at a site. */
export const ROLES = ['viewer', 'commissioning', 'designer', 'reviewer', 'administrator'] as const;
export const Role = z.enum(ROLES);
export type Role = z.infer<typeof Role>;

/** What a role may do at its site. `draw` covers the network, its cases and trap models; `readings` covers gauges. */
export const PERMISSIONS = ['view', 'draw', 'readings', 'comment', 'sign', 'people'] as const;
export const Permission = z.enum(PERMISSIONS);
export type Permission = z.infer<typeof Permission>;

const PERMISSIONS_OF: Readonly<Record<Role, readonly Permission[]>> = {
  viewer: ['view'],
  commissioning: ['view', 'readings', 'comment'],
  designer: ['view', 'draw', 'readings', 'comment'],
  reviewer: ['view', 'comment', 'sign'],
  administrator: ['view', 'draw', 'readings', 'comment', 'people'],
};

export function permissionsOf(role: Role): readonly Permission[] {
  return PERMISSIONS_OF[role];
}

export function roleMay(role: Role, permission: Permission): boolean {
  return PERMISSIONS_OF[role].includes(permission);
}
