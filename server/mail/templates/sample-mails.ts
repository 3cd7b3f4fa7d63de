import { letter, type MailTemplate } from './template'

export interface SamplesRequestedProps {
  requestId: string
  number: string
  customerName: string
  /** Calendar date, ISO 8601. */
  dueOn: string
}

export interface SampleProps {
  requestId: string
  number: string
}

const vendorLink = ({ requestId }: SampleProps) => ({ path: `/sample-requests/${requestId}` as const, welcomesNewcomers: true })

/** To the people of the vendor. */
export const samplesRequestedMail: MailTemplate<SamplesRequestedProps> = {
  link: vendorLink,
  write: ({ number, customerName, dueOn }, frame) => ({
    subject: `${customerName} asks you for samples: ${number}`,
    text: letter(frame, [`${customerName} asks you for samples with a test report, due on ${dueOn}.`, '', `See what is asked and hand in your report here: ${frame.link}`]),
  }),
}

export const samplesCancelledMail: MailTemplate<SampleProps> = {
  link: vendorLink,
  write: ({ number }, frame) => ({
    subject: `The samples ${number} are no longer needed`,
    text: letter(frame, [`The request for samples ${number} was taken back. Thank you for your work.`, '', `It stands here: ${frame.link}`]),
  }),
}

/** To quality and engineering of the customer; whether the parts pass is said only after signing in. */
export const sampleReportMail: MailTemplate<SampleProps & { vendorName: string }> = {
  link: ({ requestId }) => ({ path: `/samples/${requestId}` }),
  write: ({ number, vendorName }, frame) => ({
    subject: `A sample report has arrived: ${number}`,
    text: letter(frame, [`${vendorName} has handed in a sample report for ${number}. It waits for a disposition.`, '', `Read it here: ${frame.link}`]),
  }),
}

export const sampleDisposedMail: MailTemplate<SampleProps & { customerName: string }> = {
  link: vendorLink,
  write: ({ number, customerName }, frame) => ({
    subject: `Your sample report for ${number} was decided about`,
    text: letter(frame, [`${customerName} has decided about your sample report for ${number}.`, '', `Read the decision here: ${frame.link}`]),
  }),
}
