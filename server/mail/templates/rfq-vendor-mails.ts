import { letter, type MailTemplate } from './template'

export interface RfqVendorProps {
  rfqId: string
  number: string
  customerName: string
  /** ISO 8601. */
  dueAt: string
}

const vendorPath = ({ rfqId }: Pick<RfqVendorProps, 'rfqId'>): `/${string}` => `/enquiries/${rfqId}`

/** To every person of an invited vendor; who has no password yet sets one on the way. */
export const rfqInvitationMail: MailTemplate<RfqVendorProps> = {
  link: (props) => ({ path: vendorPath(props), welcomesNewcomers: true }),
  write: ({ number, customerName, dueAt }, frame) => ({
    subject: `${customerName} asks for a quotation: ${number}`,
    text: letter(frame, [
      `${customerName} asks you for a quotation. It is due on ${frame.moment(dueAt)}.`,
      '',
      `See the enquiry here: ${frame.link}`,
      ...(frame.linkValidUntil ? [`The link sets your password, works once and until ${frame.linkValidUntil}.`] : []),
    ]),
  }),
}

export interface RfqReminderProps extends RfqVendorProps {
  invitationId: string
  /** Days before the due time. */
  days: number
}

/** To a vendor that has neither quoted nor declined. */
export const rfqReminderMail: MailTemplate<RfqReminderProps> = {
  link: (props) => ({ path: vendorPath(props), welcomesNewcomers: true }),
  write: ({ number, customerName, dueAt }, frame) => ({
    subject: `${number} is due soon`,
    text: letter(frame, [`${customerName} waits for your answer to ${number}. It is due on ${frame.moment(dueAt)}; you can also decline with a reason.`, '', `See the enquiry here: ${frame.link}`]),
  }),
}

export const rfqExtendedMail: MailTemplate<RfqVendorProps> = {
  link: (props) => ({ path: vendorPath(props), welcomesNewcomers: true }),
  write: ({ number, dueAt }, frame) => ({
    subject: `${number} is due later`,
    text: letter(frame, [`The due time of ${number} has moved to ${frame.moment(dueAt)}. What you have submitted stays valid and may be replaced.`, '', `See the enquiry here: ${frame.link}`]),
  }),
}

export const rfqCancelledMail: MailTemplate<RfqVendorProps> = {
  link: (props) => ({ path: vendorPath(props), welcomesNewcomers: true }),
  write: ({ number }, frame) => ({
    subject: `${number} was cancelled`,
    text: letter(frame, [`The enquiry ${number} was cancelled and takes no quotations any more. Thank you for your work.`, '', `It stands here: ${frame.link}`]),
  }),
}

/** Says that, and nothing of what was found. */
export const rfqOpenedMail: MailTemplate<RfqVendorProps> = {
  link: (props) => ({ path: vendorPath(props), welcomesNewcomers: true }),
  write: ({ number }, frame) => ({
    subject: `The quotations for ${number} have been opened`,
    text: letter(frame, [`The quotations for ${number} have been opened and are being judged.`, '', `The enquiry stands here: ${frame.link}`]),
  }),
}
