import { addressProofMail } from './address-proof'
import { awardDecidedMail, awardProposedMail, orderAnsweredMail, orderPlacedMail, rfqDecidedMail } from './award-mails'
import { changeDoneMail } from './change-done'
import { changeRequestedMail } from './change-requested'
import { checkRequestedMail } from './check-requested'
import { draftReturnedMail } from './draft-returned'
import { invitationMail } from './invitation'
import { passwordResetMail } from './password-reset'
import { passwordSetMail } from './password-set'
import { quoteReceivedMail } from './quote-received'
import { revisionReleasedMail } from './revision-released'
import { openingRequestedMail, quotesOpenedMail, rfqDueMail } from './rfq-buyer-mails'
import { rfqCancelledMail, rfqExtendedMail, rfqInvitationMail, rfqOpenedMail, rfqReminderMail } from './rfq-vendor-mails'
import { sampleDisposedMail, sampleReportMail, samplesCancelledMail, samplesRequestedMail } from './sample-mails'
import type { MailTemplate } from './template'
import { vendorInvitationMail } from './vendor-invitation'

/** Names are permanent: waiting mails are kept under them. */
export const MAIL_TEMPLATES = {
  'address-proof': addressProofMail,
  'award-decided': awardDecidedMail,
  'award-proposed': awardProposedMail,
  'change-done': changeDoneMail,
  'change-requested': changeRequestedMail,
  'check-requested': checkRequestedMail,
  'draft-returned': draftReturnedMail,
  invitation: invitationMail,
  'password-reset': passwordResetMail,
  'password-set': passwordSetMail,
  'opening-requested': openingRequestedMail,
  'quote-received': quoteReceivedMail,
  'quotes-opened': quotesOpenedMail,
  'revision-released': revisionReleasedMail,
  'rfq-cancelled': rfqCancelledMail,
  'rfq-due': rfqDueMail,
  'rfq-extended': rfqExtendedMail,
  'rfq-invitation': rfqInvitationMail,
  'rfq-opened': rfqOpenedMail,
  'rfq-reminder': rfqReminderMail,
  'vendor-invitation': vendorInvitationMail,
  'order-answered': orderAnsweredMail,
  'order-placed': orderPlacedMail,
  'rfq-decided': rfqDecidedMail,
  'sample-disposed': sampleDisposedMail,
  'sample-report': sampleReportMail,
  'samples-cancelled': samplesCancelledMail,
  'samples-requested': samplesRequestedMail,
}

export type MailTemplateName = keyof typeof MAIL_TEMPLATES
export type MailProps<N extends MailTemplateName> = (typeof MAIL_TEMPLATES)[N] extends MailTemplate<infer P> ? P : never
