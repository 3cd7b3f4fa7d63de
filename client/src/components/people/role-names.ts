import type { Role } from '#shared/contracts/endpoint'

export const ROLE_NAMES: Readonly<Record<Role, string>> = {
  engineer: 'Engineer',
  checker: 'Checker',
  quality: 'Quality',
  buyer: 'Buyer',
  approver: 'Approver',
  admin: 'Administrator',
  vendor: 'Vendor',
  operator: 'Operator',
}

/** What a role does, in one line for the person who assigns it. */
export const ROLE_DUTIES: Readonly<Record<Role, string>> = {
  engineer: 'Writes winding specifications and judges deviations and samples.',
  checker: 'Checks and releases drawings of other people.',
  quality: 'Keeps vendor approvals and reads sample data.',
  buyer: 'Sends requests for quotation, opens quotations and proposes awards.',
  approver: 'Approves awards of other people up to a money limit.',
  admin: 'Manages people and vendors; reads no quotation.',
  vendor: 'Answers requests for quotation and reports samples.',
  operator: 'Looks after the installation; sees no content.',
}

export const roleNames = (roles: readonly Role[]): string => roles.map((role) => ROLE_NAMES[role]).join(', ')
