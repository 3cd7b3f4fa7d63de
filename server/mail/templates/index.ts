import { addressProofMail } from './address-proof'
import { changeDoneMail } from './change-done'
import { changeRequestedMail } from './change-requested'
import { checkRequestedMail } from './check-requested'
import { draftReturnedMail } from './draft-returned'
import { invitationMail } from './invitation'
import { passwordResetMail } from './password-reset'
import { passwordSetMail } from './password-set'
import { revisionReleasedMail } from './revision-released'
import type { MailTemplate } from './template'
import { vendorInvitationMail } from './vendor-invitation'

/** Names are permanent: waiting mails are kept under them. */
export const MAIL_TEMPLATES = {
  'address-proof': addressProofMail,
  'change-done': changeDoneMail,
  'change-requested': changeRequestedMail,
  'check-requested': checkRequestedMail,
  'draft-returned': draftReturnedMail,
  invitation: invitationMail,
  'password-reset': passwordResetMail,
  'password-set': passwordSetMail,
  'revision-released': revisionReleasedMail,
  'vendor-invitation': vendorInvitationMail,
}

export type MailTemplateName = keyof typeof MAIL_TEMPLATES
export type MailProps<N extends MailTemplateName> = (typeof MAIL_TEMPLATES)[N] extends MailTemplate<infer P> ? P : never
