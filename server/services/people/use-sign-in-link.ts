import type { Context } from '#server/context'
import { asAuth, type Transaction } from '#server/db/as-actor'
import { AppError } from '#server/errors'
import type { BodyOf } from '#shared/contracts/endpoint'
import type { SessionPerson, useSignInLink as contract } from '#shared/contracts/people'
import { acceptInvitation } from './accept-invitation'
import { applyNewAddress } from './apply-new-address'
import { createFirstPerson } from './create-first-person'
import { hashPassword } from './secrets'
import { readSessionPerson, startSession } from './sessions'
import { replacePassword, tellPasswordSet } from './set-password'
import { lockToken, useUpTokens, type TokenRow } from './sign-in-tokens'

type LinkInput = Omit<BodyOf<typeof contract>, 'token'>

export interface UsedLink {
  person: SessionPerson | null
  /** Absent when the link does not sign in. */
  cookie: string | null
}

/** Does what the link was sent for, once. */
export async function useSignInLink(ctx: Context, { token, ...input }: BodyOf<typeof contract>): Promise<UsedLink> {
  const passwordHash = input.password ? await hashPassword(input.password) : null
  return asAuth(ctx, async (tx) => {
    const row = await lockToken(tx, token)
    const personId = await follow(tx, ctx, row, input, passwordHash)
    await useUpTokens(tx, row)
    if (!personId) return { person: null, cookie: null }
    const cookie = await startSession(tx, ctx.config, personId)
    return { person: await readSessionPerson(tx, personId), cookie }
  })
}

/** Returns who is signed in by it. */
async function follow(tx: Transaction, ctx: Context, row: TokenRow, input: LinkInput, passwordHash: string | null): Promise<string | null> {
  switch (row.purpose) {
    case 'invitation':
      return acceptInvitation(tx, ctx, row.personId!, { name: input.name, passwordHash: needed(passwordHash, 'password') })
    case 'password-reset':
      return resetPassword(tx, ctx, row.personId!, needed(passwordHash, 'password'))
    case 'address-change':
      await applyNewAddress(tx, ctx, row.changeId!)
      return null
    case 'first-admin':
    case 'first-operator':
      return createFirstPerson(tx, ctx, row.purpose === 'first-admin' ? 'buying' : 'operator', {
        passwordHash: needed(passwordHash, 'password'),
        name: needed(input.name, 'name'),
        email: needed(input.email, 'email'),
        companyName: needed(input.companyName, 'companyName'),
      })
  }
}

const WORDS = { password: 'Please set a password.', name: 'Please enter your name.', email: 'Please enter your mail address.', companyName: 'Please enter the name of your company.' }

function needed<T>(value: T | null | undefined, field: keyof typeof WORDS): T {
  if (value == null) throw new AppError('invalid-input', WORDS[field], { [field]: WORDS[field] })
  return value
}

async function resetPassword(tx: Transaction, ctx: Context, personId: string, passwordHash: string): Promise<string> {
  const person = await readSessionPerson(tx, personId)
  if (!person) throw new AppError('link-expired', 'This access has ended; ask an administrator of your company.')
  await replacePassword(tx, ctx, personId, passwordHash)
  await tellPasswordSet(tx, personId, person.company.id)
  return personId
}
