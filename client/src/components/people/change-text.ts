import type { PersonChange } from '#shared/contracts/people'
import { formatMoney } from '#shared/number-format'
import { roleNames } from './role-names'

/** One sentence for what a change would do. */
export function changeText(change: PersonChange): string {
  switch (change.kind) {
    case 'email':
      return `Mail address becomes ${change.email}`
    case 'removal':
      return 'Leaves the company and can no longer sign in'
    case 'roles': {
      const limit = change.approvalLimit && change.approvalCurrency ? `, approves up to ${formatMoney(change.approvalLimit, change.approvalCurrency)}` : ''
      return `Roles become ${roleNames(change.roles)}${limit}`
    }
  }
}
