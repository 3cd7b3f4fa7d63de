import { letter, type MailTemplate } from './template'

export interface AwardProps {
  awardId: string
  rfqNumber: string
}

const awardLink = ({ awardId }: AwardProps) => ({ path: `/awards/${awardId}` as const })

/** To the approvers. */
export const awardProposedMail: MailTemplate<AwardProps> = {
  link: awardLink,
  write: ({ rfqNumber }, frame) => ({
    subject: `An award for ${rfqNumber} waits for approval`,
    text: letter(frame, [`An award for ${rfqNumber} was proposed and waits for approval.`, '', `See the comparison here: ${frame.link}`]),
  }),
}

/** To the person who proposed. */
export const awardDecidedMail: MailTemplate<AwardProps & { approved: boolean }> = {
  link: awardLink,
  write: ({ rfqNumber, approved }, frame) => ({
    subject: `The award for ${rfqNumber} was ${approved ? 'approved' : 'rejected'}`,
    text: letter(frame, [
      approved ? `Your proposal for ${rfqNumber} was approved. The purchase order can be placed.` : `Your proposal for ${rfqNumber} was rejected; the reason stands beside it.`,
      '',
      `Go on here: ${frame.link}`,
    ]),
  }),
}

export interface OrderProps {
  orderId: string
  number: string
}

/** To the people of the vendor that won. */
export const orderPlacedMail: MailTemplate<OrderProps & { customerName: string; acknowledgeBy: string }> = {
  link: ({ orderId }) => ({ path: `/purchase-orders/${orderId}`, welcomesNewcomers: true }),
  write: ({ number, customerName, acknowledgeBy }, frame) => ({
    subject: `Purchase order ${number} from ${customerName}`,
    text: letter(frame, [`${customerName} has awarded you the enquiry and placed the purchase order ${number}. Please acknowledge it by ${acknowledgeBy}.`, '', `See the order here: ${frame.link}`]),
  }),
}

/** To the people of the vendors that were not chosen: thanks, and nothing about who was or for how much. */
export const rfqDecidedMail: MailTemplate<{ rfqId: string; rfqNumber: string; customerName: string }> = {
  link: ({ rfqId }) => ({ path: `/enquiries/${rfqId}`, welcomesNewcomers: true }),
  write: ({ rfqNumber, customerName }, frame) => ({
    subject: `The enquiry ${rfqNumber} has been decided`,
    text: letter(frame, [
      `${customerName} has decided about ${rfqNumber}, and this time not in favour of your quotation. Thank you for the work you put into it.`,
      'Please delete the documents of this enquiry as your confidentiality agreement says.',
      '',
      `The enquiry stands here: ${frame.link}`,
    ]),
  }),
}

/** To the buyers of the customer. */
export const orderAnsweredMail: MailTemplate<OrderProps & { vendorName: string }> = {
  link: ({ orderId }) => ({ path: `/orders/${orderId}` }),
  write: ({ number, vendorName }, frame) => ({
    subject: `${vendorName} has answered the purchase order ${number}`,
    text: letter(frame, [`${vendorName} has answered the purchase order ${number}.`, '', `Read the answer here: ${frame.link}`]),
  }),
}
