import type { Access, Role } from '#shared/contracts/endpoint'

/** Whether somebody with these roles, or nobody (null), may open what asks for this access. The server decides again. */
export function mayOpen(access: Access, roles: readonly Role[] | null): boolean {
  if (access === 'public') return true
  if (roles === null) return false
  return access === 'signed-in' || access.some((role) => roles.includes(role))
}
