import type { Context } from '#server/context'
import { readSignInLink } from '#server/services/people/read-sign-in-link'
import { requestPasswordReset } from '#server/services/people/request-password-reset'
import { changePassword } from '#server/services/people/set-password'
import { signIn } from '#server/services/people/sign-in'
import { signOut } from '#server/services/people/sign-out'
import { useSignInLink } from '#server/services/people/use-sign-in-link'
import * as contract from '#shared/contracts/people'
import { Router } from 'express'
import { handle } from './handle'

export function signInRoutes(ctx: Context): Router {
  const router = Router()

  handle(router, contract.signIn, async ({ body, ip, setCookie }) => {
    const { person, cookie } = await signIn(ctx, { ...body, ip })
    setCookie(cookie)
    return person
  })

  handle(router, contract.signOut, async ({ session, setCookie }) => {
    setCookie(await signOut(ctx, session!))
    return {}
  })

  handle(router, contract.readSession, async ({ session }) => ({ person: session?.person ?? null }))

  handle(router, contract.changePassword, async ({ session, body, setCookie }) => {
    setCookie(await changePassword(ctx, session!.person, body))
    return {}
  })

  handle(router, contract.requestPasswordReset, async ({ body, ip }) => {
    await requestPasswordReset(ctx, { ...body, ip })
    return {}
  })

  handle(router, contract.readSignInLink, ({ body }) => readSignInLink(ctx, body.token))

  handle(router, contract.useSignInLink, async ({ body, setCookie }) => {
    const { person, cookie } = await useSignInLink(ctx, body)
    if (cookie) setCookie(cookie)
    return { person }
  })

  return router
}
