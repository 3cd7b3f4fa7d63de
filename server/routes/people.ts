import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { AppError, notFound } from '#server/errors'
import { canManagePeople, canUpdateVendorRelation } from '#server/policies/people'
import { listChanges } from '#server/services/people/change-requests'
import { createCompany, listCompanies, updateCompany } from '#server/services/people/companies'
import { acceptCustomer, listCustomers } from '#server/services/people/customers'
import { confirmChange, refuseChange } from '#server/services/people/decide-change'
import { invitePerson, resendInvitation } from '#server/services/people/invite-person'
import { inviteVendor } from '#server/services/people/invite-vendor'
import { findPerson, listPeople } from '#server/services/people/list-people'
import { requestChange } from '#server/services/people/request-change'
import { openAgreement, storeAgreement, updateVendor } from '#server/services/people/update-vendor'
import { findVendor, findVendorRelation, listVendors } from '#server/services/people/vendors'
import * as contract from '#shared/contracts/people'
import { Router } from 'express'
import { handle } from './handle'
import { signInRoutes } from './sign-in'

export function peopleRoutes(ctx: Context): Router {
  const router = Router()
  router.use(signInRoutes(ctx), vendorRoutes(ctx), companyRoutes(ctx))

  handle(router, contract.listPeople, ({ actor }) => asActor(ctx, actor, (tx) => listPeople(tx, actor)))

  handle(router, contract.invitePerson, ({ actor, body }) =>
    asActor(ctx, actor, async (tx) => {
      if (!canManagePeople(actor, actor)) throw new AppError('not-allowed', 'Your role does not do this.')
      return invitePerson(tx, actor, body)
    }),
  )

  handle(router, contract.resendInvitation, ({ actor, params }) =>
    asActor(ctx, actor, async (tx) => {
      const person = await findPerson(tx, actor, params.personId)
      if (!person || !canManagePeople(actor, person)) throw notFound('person')
      await resendInvitation(tx, actor, person)
      return {}
    }),
  )

  handle(router, contract.requestChange, ({ actor, params, body }) =>
    asActor(ctx, actor, async (tx) => {
      const person = await findPerson(tx, actor, params.personId)
      if (!person || !canManagePeople(actor, person)) throw notFound('person')
      return requestChange(tx, actor, person, body)
    }),
  )

  handle(router, contract.listChanges, ({ actor }) => asActor(ctx, actor, (tx) => listChanges(tx, actor)))

  handle(router, contract.confirmChange, ({ actor, params }) =>
    asActor(ctx, actor, async (tx) => {
      await confirmChange(tx, actor, params.changeId)
      return {}
    }),
  )

  handle(router, contract.refuseChange, ({ actor, params }) =>
    asActor(ctx, actor, async (tx) => {
      await refuseChange(tx, actor, params.changeId)
      return {}
    }),
  )

  return router
}

function vendorRoutes(ctx: Context): Router {
  const router = Router()

  handle(router, contract.listVendors, ({ actor }) => asActor(ctx, actor, (tx) => listVendors(tx, actor)))

  handle(router, contract.readVendor, ({ actor, params }) =>
    asActor(ctx, actor, async (tx) => {
      const vendor = await findVendor(tx, actor, params.vendorId)
      if (!vendor) throw notFound('vendor')
      return vendor
    }),
  )

  handle(router, contract.inviteVendor, ({ actor, body }) => inviteVendor(ctx, actor, body))

  handle(router, contract.updateVendor, ({ actor, params, body }) =>
    asActor(ctx, actor, async (tx) => {
      const relation = await findVendorRelation(tx, actor, params.vendorId)
      if (!relation || !canUpdateVendorRelation(actor, relation)) throw notFound('vendor')
      return updateVendor(tx, actor, relation, body)
    }),
  )

  handle(router, contract.uploadAgreement, ({ actor, params, file }) => storeAgreement(ctx, actor, params.vendorId, file!))
  handle(router, contract.downloadAgreement, ({ actor, params }) => openAgreement(ctx, actor, params.vendorId))

  handle(router, contract.listCustomers, ({ actor }) => asActor(ctx, actor, (tx) => listCustomers(tx, actor)))
  handle(router, contract.acceptCustomer, ({ actor, params }) => asActor(ctx, actor, (tx) => acceptCustomer(tx, actor, params.customerId)))

  return router
}

function companyRoutes(ctx: Context): Router {
  const router = Router()
  handle(router, contract.updateCompany, ({ actor, body }) => asActor(ctx, actor, (tx) => updateCompany(tx, actor, body)))
  handle(router, contract.listCompanies, ({ actor }) => asActor(ctx, actor, (tx) => listCompanies(tx)))
  handle(router, contract.createCompany, ({ actor, body }) => asActor(ctx, actor, (tx) => createCompany(tx, actor, body)))
  return router
}
