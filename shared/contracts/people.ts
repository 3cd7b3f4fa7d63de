import { z } from 'zod'
import {
  countrySchema,
  currencySchema,
  emailSchema,
  idSchema,
  momentSchema,
  moneyInputSchema,
  moneySchema,
  optionalText,
  passwordSchema,
  requiredText,
  roleSchema,
  TEXT_LIMITS,
  timeZoneSchema,
} from './common'
import { BUYING_ROLES, COMPANY_KINDS, defineEndpoint, type Role } from './endpoint'

/** Roles that exclude each other: who manages accounts neither buys, approves nor quotes. */
export const EXCLUDED_BY_ADMIN: readonly Role[] = ['buyer', 'approver', 'vendor']

/** True when one person may hold all of the roles at once. */
export function rolesCompatible(roles: readonly Role[]): boolean {
  return !roles.includes('admin') || !roles.some((role) => EXCLUDED_BY_ADMIN.includes(role))
}

/** A role may be held once; `admin` excludes buyer, approver and vendor; an approver has a money limit. */
const rolesShape = {
  roles: z.array(roleSchema).min(1, 'Choose at least one role.').max(BUYING_ROLES.length),
  approvalLimit: moneyInputSchema.nullable().default(null),
  approvalCurrency: currencySchema.nullable().default(null),
}

interface RolesInput {
  roles: Role[]
  approvalLimit: string | null
  approvalCurrency: string | null
}

function checkRoles({ roles, approvalLimit, approvalCurrency }: RolesInput, context: z.RefinementCtx): void {
  const refuse = (path: string, message: string) => context.addIssue({ code: 'custom', path: [path], message })
  if (new Set(roles).size !== roles.length) refuse('roles', 'A role is named twice.')
  if (!rolesCompatible(roles)) refuse('roles', 'An administrator cannot also be buyer, approver or vendor.')
  if (roles.includes('approver') !== (approvalLimit !== null)) refuse('approvalLimit', 'An approver, and only an approver, has a money limit.')
  if ((approvalLimit === null) !== (approvalCurrency === null)) refuse('approvalCurrency', 'A money limit needs its currency, and a currency its limit.')
}

export const companySchema = z.object({
  id: idSchema,
  kind: z.enum(COMPANY_KINDS),
  name: z.string(),
  country: countrySchema,
  timeZone: timeZoneSchema,
  currency: currencySchema,
  address: z.string(),
})
export type Company = z.infer<typeof companySchema>

/** Who is signed in, as the client needs it to choose what to show. The server decides again on every request. */
export const sessionPersonSchema = z.object({
  id: idSchema,
  name: z.string(),
  email: z.string(),
  roles: z.array(roleSchema),
  approvalLimit: moneySchema.nullable(),
  approvalCurrency: currencySchema.nullable(),
  company: companySchema,
})
export type SessionPerson = z.infer<typeof sessionPersonSchema>

export const signIn = defineEndpoint({
  method: 'POST',
  path: '/api/sign-in',
  summary: 'Sign in with mail address and password',
  access: 'public',
  body: z.strictObject({
    email: emailSchema,
    password: z.string({ error: 'The password is missing.' }).min(1, 'The password is missing.').max(TEXT_LIMITS.password),
  }),
  response: sessionPersonSchema,
})

export const signOut = defineEndpoint({
  method: 'POST',
  path: '/api/sign-out',
  summary: 'End the session',
  access: 'signed-in',
})

export const readSession = defineEndpoint({
  method: 'GET',
  path: '/api/session',
  summary: 'Who is signed in, if anybody',
  access: 'public',
  response: z.object({ person: sessionPersonSchema.nullable() }),
})

export const changePassword = defineEndpoint({
  method: 'POST',
  path: '/api/password',
  summary: 'Set a new password; ends every session and starts a new one here',
  access: 'signed-in',
  body: z.strictObject({ currentPassword: z.string().min(1, 'The present password is missing.').max(TEXT_LIMITS.password), newPassword: passwordSchema }),
})

export const requestPasswordReset = defineEndpoint({
  method: 'POST',
  path: '/api/password-reset',
  summary: 'Ask for a link to set a new password; answers the same whether or not the address is known',
  access: 'public',
  body: z.strictObject({ email: emailSchema }),
})

export const LINK_PURPOSES = ['invitation', 'password-reset', 'address-change', 'first-admin', 'first-operator'] as const
const tokenSchema = z.string({ error: 'The link is incomplete.' }).min(20, 'The link is incomplete.').max(200, 'The link is not one of ours.')

export const signInLinkSchema = z.object({
  purpose: z.enum(LINK_PURPOSES),
  name: z.string().nullable(),
  email: z.string().nullable(),
  companyName: z.string().nullable(),
  companyKind: z.enum(COMPANY_KINDS).nullable(),
  /** Names of the buying companies that invited this vendor, if it is an invitation to a vendor. */
  invitedBy: z.array(z.string()),
  expiresAt: momentSchema,
})
export type SignInLink = z.infer<typeof signInLinkSchema>

// The token travels in the body, so that it stands in no server log.
export const readSignInLink = defineEndpoint({
  method: 'POST',
  path: '/api/sign-in-links/read',
  summary: 'What a mail link is for',
  access: 'public',
  body: z.strictObject({ token: tokenSchema }),
  response: signInLinkSchema,
})

export const useSignInLink = defineEndpoint({
  method: 'POST',
  path: '/api/sign-in-links/use',
  summary: 'Use a mail link once: sets the password (invitation, reset, first administrator) or the new address',
  access: 'public',
  body: z.strictObject({
    token: tokenSchema,
    password: passwordSchema.optional(),
    /** For an invitation: the person's own spelling. For a first administrator: required. */
    name: requiredText('The name', TEXT_LIMITS.name).optional(),
    email: emailSchema.optional(),
    companyName: requiredText('The company', TEXT_LIMITS.name).optional(),
  }),
  response: z.object({ person: sessionPersonSchema.nullable() }),
})

export const PERSON_STATES = ['invited', 'active', 'left'] as const

export const personSchema = z.object({
  id: idSchema,
  name: z.string(),
  email: z.string(),
  companyId: idSchema,
  roles: z.array(roleSchema),
  approvalLimit: moneySchema.nullable(),
  approvalCurrency: currencySchema.nullable(),
  state: z.enum(PERSON_STATES),
  createdAt: momentSchema,
})
export type Person = z.infer<typeof personSchema>

const personParams = z.strictObject({ personId: idSchema })

export const listPeople = defineEndpoint({
  method: 'GET',
  path: '/api/people',
  summary: 'The people of the own company',
  access: 'signed-in',
  response: z.array(personSchema),
})

export const invitePersonSchema = z
  .strictObject({ name: requiredText('The name', TEXT_LIMITS.name), email: emailSchema, ...rolesShape })
  .superRefine(checkRoles)
export type InvitePerson = z.infer<typeof invitePersonSchema>

export const invitePerson = defineEndpoint({
  method: 'POST',
  path: '/api/people',
  summary: 'Invite a person to the own company',
  access: ['admin', 'vendor', 'operator'],
  body: invitePersonSchema,
  response: personSchema,
})

export const resendInvitation = defineEndpoint({
  method: 'POST',
  path: '/api/people/:personId/invitation',
  summary: 'Send the invitation again',
  access: ['admin', 'vendor', 'operator'],
  params: personParams,
})

export const personChangeSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('roles'), ...rolesShape }).superRefine(checkRoles),
  z.strictObject({ kind: z.literal('email'), email: emailSchema }),
  z.strictObject({ kind: z.literal('removal') }),
])
export type PersonChange = z.infer<typeof personChangeSchema>

export const CHANGE_STATES = ['requested', 'confirmed', 'refused', 'done'] as const

export const changeRequestSchema = z.object({
  id: idSchema,
  personId: idSchema,
  personName: z.string(),
  change: personChangeSchema,
  requestedBy: idSchema,
  requestedByName: z.string(),
  state: z.enum(CHANGE_STATES),
  /** True when the asking person is one who may confirm it now. */
  mayConfirm: z.boolean(),
  requestedAt: momentSchema,
  decidedAt: momentSchema.nullable(),
})
export type ChangeRequest = z.infer<typeof changeRequestSchema>

const changeParams = z.strictObject({ changeId: idSchema })

export const listChanges = defineEndpoint({
  method: 'GET',
  path: '/api/people-changes',
  summary: 'Changes of roles and mail addresses, waiting and decided',
  access: 'signed-in',
  response: z.array(changeRequestSchema),
})

export const requestChange = defineEndpoint({
  method: 'POST',
  path: '/api/people/:personId/changes',
  summary: 'Ask for a change of roles or mail address, or for a removal; a second person confirms it',
  access: ['admin', 'vendor', 'operator'],
  params: personParams,
  body: personChangeSchema,
  response: z.object({ id: idSchema }),
})

export const confirmChange = defineEndpoint({
  method: 'POST',
  path: '/api/people-changes/:changeId/confirmation',
  summary: 'Confirm a change as the second person',
  access: 'signed-in',
  params: changeParams,
})

export const refuseChange = defineEndpoint({
  method: 'POST',
  path: '/api/people-changes/:changeId/refusal',
  summary: 'Refuse a change',
  access: 'signed-in',
  params: changeParams,
})

export const VENDOR_APPROVALS = ['not-assessed', 'approved', 'conditional', 'blocked'] as const
export const VENDOR_STATES = ['invited', 'accepted'] as const

/** A vendor as one buying company knows it. Approval, confidentiality and notes are that company's own. */
export const vendorSchema = z.object({
  /** Identifier of the vendor company; other documents refer to it. */
  id: idSchema,
  /** The buying company's own name for the vendor. */
  name: z.string(),
  contactName: z.string(),
  contactEmail: z.string(),
  state: z.enum(VENDOR_STATES),
  approval: z.enum(VENDOR_APPROVALS),
  confidentialityAgreedOn: z.iso.date().nullable(),
  confidentialityExpiresOn: z.iso.date().nullable(),
  agreementFileName: z.string().nullable(),
  notes: z.string(),
  /** People of the vendor; empty until the first contact has accepted. */
  people: z.array(z.object({ id: idSchema, name: z.string(), email: z.string() })),
  invitedAt: momentSchema,
})
export type Vendor = z.infer<typeof vendorSchema>

const vendorParams = z.strictObject({ vendorId: idSchema })

export const listVendors = defineEndpoint({
  method: 'GET',
  path: '/api/vendors',
  summary: 'The vendors of the own buying company',
  access: BUYING_ROLES,
  response: z.array(vendorSchema),
})

export const readVendor = defineEndpoint({
  method: 'GET',
  path: '/api/vendors/:vendorId',
  summary: 'One vendor of the own buying company',
  access: BUYING_ROLES,
  params: vendorParams,
  response: vendorSchema,
})

export const inviteVendorSchema = z.strictObject({
  name: requiredText('The company', TEXT_LIMITS.name),
  country: countrySchema,
  contactName: requiredText('The contact’s name', TEXT_LIMITS.name),
  contactEmail: emailSchema,
})
export type InviteVendor = z.infer<typeof inviteVendorSchema>

export const inviteVendor = defineEndpoint({
  method: 'POST',
  path: '/api/vendors',
  summary: 'Invite a vendor company by its first contact; answers the same whether or not the address is known',
  access: ['admin'],
  body: inviteVendorSchema,
  response: vendorSchema,
})

export const updateVendorSchema = z
  .strictObject({
    name: requiredText('The name', TEXT_LIMITS.name),
    approval: z.enum(VENDOR_APPROVALS),
    confidentialityAgreedOn: z.iso.date().nullable(),
    confidentialityExpiresOn: z.iso.date().nullable(),
    notes: optionalText('The note', TEXT_LIMITS.note),
  })
  .refine((v) => !v.confidentialityExpiresOn || (v.confidentialityAgreedOn !== null && v.confidentialityExpiresOn > v.confidentialityAgreedOn), {
    path: ['confidentialityExpiresOn'],
    message: 'The agreement ends after it begins; give both dates.',
  })
export type UpdateVendor = z.infer<typeof updateVendorSchema>

export const updateVendor = defineEndpoint({
  method: 'PUT',
  path: '/api/vendors/:vendorId',
  summary: 'Keep approval, confidentiality and notes about a vendor',
  access: ['buyer', 'quality'],
  params: vendorParams,
  body: updateVendorSchema,
  response: vendorSchema,
})

export const uploadAgreement = defineEndpoint({
  method: 'POST',
  path: '/api/vendors/:vendorId/agreement',
  summary: 'Keep the signed confidentiality agreement with a vendor',
  access: ['buyer', 'quality'],
  params: vendorParams,
  upload: { field: 'file', kinds: ['pdf', 'docx', 'odt', 'png', 'jpeg'], required: true },
  response: vendorSchema,
})

export const downloadAgreement = defineEndpoint({
  method: 'GET',
  path: '/api/vendors/:vendorId/agreement',
  summary: 'The signed confidentiality agreement with a vendor',
  access: ['buyer', 'quality', 'approver'],
  params: vendorParams,
  download: ['application/octet-stream'],
})

export const customerSchema = z.object({
  id: idSchema,
  name: z.string(),
  country: countrySchema,
  state: z.enum(VENDOR_STATES),
  invitedAt: momentSchema,
})
export type Customer = z.infer<typeof customerSchema>

export const listCustomers = defineEndpoint({
  method: 'GET',
  path: '/api/customers',
  summary: 'The buying companies that invited the own vendor company',
  access: ['vendor'],
  response: z.array(customerSchema),
})

export const acceptCustomer = defineEndpoint({
  method: 'POST',
  path: '/api/customers/:customerId/acceptance',
  summary: 'Accept the invitation of a buying company',
  access: ['vendor'],
  params: z.strictObject({ customerId: idSchema }),
  response: customerSchema,
})

export const updateCompanySchema = z.strictObject({
  name: requiredText('The name', TEXT_LIMITS.name),
  country: countrySchema,
  timeZone: timeZoneSchema,
  currency: currencySchema,
  address: optionalText('The address', 1000),
})

export const updateCompany = defineEndpoint({
  method: 'PUT',
  path: '/api/company',
  summary: 'Name, address, time zone and currency of the own company',
  access: ['admin', 'vendor', 'operator'],
  body: updateCompanySchema,
  response: companySchema,
})

export const listCompanies = defineEndpoint({
  method: 'GET',
  path: '/api/companies',
  summary: 'The companies of the installation',
  access: ['operator'],
  response: z.array(z.object({ ...companySchema.shape, peopleCount: z.int(), createdAt: momentSchema })),
})

export const createCompany = defineEndpoint({
  method: 'POST',
  path: '/api/companies',
  summary: 'Set up a buying company and invite its first administrator',
  access: ['operator'],
  body: z.strictObject({
    ...updateCompanySchema.shape,
    adminName: requiredText('The administrator’s name', TEXT_LIMITS.name),
    adminEmail: emailSchema,
  }),
  response: companySchema,
})
