import { letter, type MailTemplate } from './template'

export interface RfqMailProps {
  rfqId: string
  number: string
}

export const rfqPath = ({ rfqId }: RfqMailProps): `/${string}` => `/rfqs/${rfqId}`

/** To those who may be the second of the two persons. */
export const openingRequestedMail: MailTemplate<RfqMailProps> = {
  link: (props) => ({ path: rfqPath(props) }),
  write: ({ number }, frame) => ({
    subject: `${number} waits to be opened`,
    text: letter(frame, [`The due time of ${number} has passed and its buyer asks for the opening. A second person with another role opens.`, '', `Open it here: ${frame.link}`]),
  }),
}

/** To purchasing. */
export const quotesOpenedMail: MailTemplate<RfqMailProps> = {
  link: (props) => ({ path: rfqPath(props) }),
  write: ({ number }, frame) => ({
    subject: `${number} is open`,
    text: letter(frame, [`The quotations for ${number} are open and can be compared.`, '', `See them here: ${frame.link}`]),
  }),
}

/** To the buyer, when the due time has passed. */
export const rfqDueMail: MailTemplate<RfqMailProps> = {
  link: (props) => ({ path: rfqPath(props) }),
  write: ({ number }, frame) => ({
    subject: `${number} is closed for quotations`,
    text: letter(frame, [`The due time of ${number} has passed. Ask for the opening; a second person with another role opens.`, '', `Go on here: ${frame.link}`]),
  }),
}
