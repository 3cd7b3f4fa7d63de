import { defineQueryOptions, useMutation, useQueryCache } from '@pinia/colada'
import { computed } from 'vue'
import type { z } from 'zod'
import type { BodyOf } from '#shared/contracts/endpoint'
import * as people from '#shared/contracts/people'
import { call } from '@/api/call'
import { download } from '@/api/download'
import { forgetDrafts } from '@/composables/useDraft'
import { useUpload } from '@/composables/useUpload'
import { useSessionStore } from '@/stores/session'

const PEOPLE_KEYS = {
  root: ['people'] as const,
  changes: ['people', 'changes'] as const,
  vendors: ['vendors'] as const,
  vendor: (vendorId: string) => ['vendors', vendorId] as const,
  customers: ['customers'] as const,
  companies: ['companies'] as const,
  link: (token: string) => ['sign-in-link', token] as const,
}

export const peopleQuery = defineQueryOptions({ key: PEOPLE_KEYS.root, query: () => call(people.listPeople) })
export const changesQuery = defineQueryOptions({ key: PEOPLE_KEYS.changes, query: () => call(people.listChanges) })
export const vendorsQuery = defineQueryOptions({ key: PEOPLE_KEYS.vendors, query: () => call(people.listVendors) })
export const customersQuery = defineQueryOptions({ key: PEOPLE_KEYS.customers, query: () => call(people.listCustomers) })
export const companiesQuery = defineQueryOptions({ key: PEOPLE_KEYS.companies, query: () => call(people.listCompanies) })

export const vendorQuery = defineQueryOptions((vendorId: string) => ({
  key: PEOPLE_KEYS.vendor(vendorId),
  query: () => call(people.readVendor, { params: { vendorId } }),
}))

export const signInLinkQuery = defineQueryOptions((token: string) => ({
  key: PEOPLE_KEYS.link(token),
  query: () => call(people.readSignInLink, { body: { token } }),
}))

export function useSignIn() {
  const session = useSessionStore()
  return useMutation({
    mutation: (body: BodyOf<typeof people.signIn>) => call(people.signIn, { body }),
    onSuccess: (person) => session.start(person),
  })
}

/** For the dialog over a sheet whose session has ended: the same person, the password again. */
export function useSignInAgain() {
  const session = useSessionStore()
  return useMutation({
    mutation: (password: string) => call(people.signIn, { body: { email: session.person?.email ?? '', password } }),
    onSuccess: (person) => session.resume(person),
  })
}

export function useSignOut() {
  return useMutation({
    mutation: () => call(people.signOut),
    onSuccess: () => {
      forgetDrafts()
      // A fresh page: nothing of this person stays in memory.
      location.assign('/sign-in')
    },
  })
}

export function useUseSignInLink() {
  const session = useSessionStore()
  return useMutation({
    mutation: (body: z.input<typeof people.useSignInLink.body>) => call(people.useSignInLink, { body }),
    onSuccess: ({ person }) => {
      if (person) session.start(person)
    },
  })
}

export const useRequestPasswordReset = () =>
  useMutation({ mutation: (email: string) => call(people.requestPasswordReset, { body: { email } }) })

export const useChangePassword = () =>
  useMutation({ mutation: (body: BodyOf<typeof people.changePassword>) => call(people.changePassword, { body }) })

export function useInvitePerson() {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: z.input<typeof people.invitePersonSchema>) => call(people.invitePerson, { body }),
    onSettled: () => cache.invalidateQueries({ key: PEOPLE_KEYS.root }),
  })
}

export const useResendInvitation = () =>
  useMutation({ mutation: (personId: string) => call(people.resendInvitation, { params: { personId } }) })

export function useRequestChange(personId: string) {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: z.input<typeof people.personChangeSchema>) => call(people.requestChange, { params: { personId }, body }),
    onSettled: () => cache.invalidateQueries({ key: PEOPLE_KEYS.root }),
  })
}

export function useDecideChange() {
  const cache = useQueryCache()
  return useMutation({
    mutation: ({ changeId, confirmed }: { changeId: string; confirmed: boolean }) =>
      call(confirmed ? people.confirmChange : people.refuseChange, { params: { changeId } }),
    onSettled: () => cache.invalidateQueries({ key: PEOPLE_KEYS.root }),
  })
}

export function useInviteVendor() {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: people.InviteVendor) => call(people.inviteVendor, { body }),
    onSettled: () => cache.invalidateQueries({ key: PEOPLE_KEYS.vendors }),
  })
}

export function useUpdateVendor(vendorId: string) {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: people.UpdateVendor) => call(people.updateVendor, { params: { vendorId }, body }),
    onSettled: () => cache.invalidateQueries({ key: PEOPLE_KEYS.vendors }),
  })
}

/** The signed agreement with a vendor: sent with progress, fetched as a file. */
export function useAgreement(vendorId: string) {
  const cache = useQueryCache()
  const { progress, send, stop } = useUpload(people.uploadAgreement)
  const sending = useMutation({
    mutation: (file: File) => send(file, { params: { vendorId } }),
    onSettled: () => cache.invalidateQueries({ key: PEOPLE_KEYS.vendors }),
  })
  const fetching = useMutation({ mutation: () => download(people.downloadAgreement, { params: { vendorId } }) })
  const error = computed(() => sending.error.value ?? fetching.error.value)
  return { progress, stop, error, keep: sending.mutate, fetch: () => fetching.mutate() }
}

export function useAcceptCustomer() {
  const cache = useQueryCache()
  return useMutation({
    mutation: (customerId: string) => call(people.acceptCustomer, { params: { customerId } }),
    onSettled: () => cache.invalidateQueries({ key: PEOPLE_KEYS.customers }),
  })
}

export function useUpdateCompany() {
  const session = useSessionStore()
  return useMutation({
    mutation: (body: BodyOf<typeof people.updateCompany>) => call(people.updateCompany, { body }),
    onSuccess: (company) => {
      if (session.person) session.start({ ...session.person, company })
    },
  })
}

export function useCreateCompany() {
  const cache = useQueryCache()
  return useMutation({
    mutation: (body: BodyOf<typeof people.createCompany>) => call(people.createCompany, { body }),
    onSettled: () => cache.invalidateQueries({ key: PEOPLE_KEYS.companies }),
  })
}
