import { letter, type MailTemplate } from './template'

export interface AddressProofProps {
  changeId: string
}

/** To the new address, which counts from the moment its link is followed. */
export const addressProofMail: MailTemplate<AddressProofProps> = {
  link: ({ changeId }) => ({ singleUse: 'address-change', validHours: 48, changeId }),
  write: (_, frame) => ({
    subject: 'Confirm your new mail address',
    text: letter(frame, [
      'This address is to become the one that you sign in with.',
      '',
      `Confirm it here: ${frame.link}`,
      `The link works once and until ${frame.linkValidUntil}.`,
    ]),
  }),
}
