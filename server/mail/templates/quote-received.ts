import { letter, type MailTemplate } from './template'

export interface QuoteReceivedProps {
  rfqId: string
  number: string
  revision: number
  /** SHA-256 of the submitted content. */
  sha256: string
  at: string
}

/** The receipt, to the person who submitted. */
export const quoteReceivedMail: MailTemplate<QuoteReceivedProps> = {
  link: ({ rfqId }) => ({ path: `/enquiries/${rfqId}` }),
  write: ({ number, revision, sha256, at }, frame) => ({
    subject: `Receipt: your quotation for ${number}, revision ${revision}`,
    text: letter(frame, [
      `Your quotation for ${number}, revision ${revision}, was received whole on ${frame.moment(at)}. It stays sealed until the opening.`,
      `SHA-256 of its content: ${sha256}`,
      '',
      `You may replace or withdraw it until the due time: ${frame.link}`,
    ]),
  }),
}
