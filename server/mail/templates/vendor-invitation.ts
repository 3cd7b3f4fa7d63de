import { letter, type MailTemplate } from './template'

export interface VendorInvitationProps {
  buyingCompanyName: string
}

/** To the contact of a vendor that a buying company wants to send enquiries to, known here or not. */
export const vendorInvitationMail: MailTemplate<VendorInvitationProps> = {
  link: () => ({ path: '/customers', welcomesNewcomers: true }),
  write: ({ buyingCompanyName }, frame) => ({
    subject: `${buyingCompanyName} invites you as a vendor`,
    text: letter(frame, [
      `${buyingCompanyName} would like to send you enquiries for wound components.`,
      '',
      `Accept here: ${frame.link}`,
      ...(frame.linkValidUntil ? [`The link works once and until ${frame.linkValidUntil}.`] : []),
    ]),
  }),
}
