import { letter, type MailTemplate } from './template'

export interface InvitationProps {
  companyName: string
}

/** To a new person of a company. */
export const invitationMail: MailTemplate<InvitationProps> = {
  link: () => ({ singleUse: 'invitation', validHours: 7 * 24 }),
  write: ({ companyName }, frame) => ({
    subject: `${companyName} invites you to Dotside`,
    text: letter(frame, [
      `${companyName} has invited you to work with it in Dotside, where wound components are specified, quoted and ordered.`,
      '',
      `Set your password here: ${frame.link}`,
      `The link works once and until ${frame.linkValidUntil}.`,
    ]),
  }),
}
