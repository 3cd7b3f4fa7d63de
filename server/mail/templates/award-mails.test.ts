import { expect, it } from 'vitest'
import { awardDecidedMail, awardProposedMail, orderAnsweredMail, orderPlacedMail, rfqDecidedMail } from './award-mails'
import { sampleDisposedMail, sampleReportMail, samplesCancelledMail, samplesRequestedMail } from './sample-mails'
import type { MailFrame } from './template'

const frame: MailFrame = { link: 'http://dotside.test/somewhere', recipientName: 'Ann Lund', linkValidUntil: '', moment: (iso) => iso }

it('asks a vendor for samples', () => {
  const props = { requestId: 'r1', number: 'SR-26-ABCDE', customerName: 'Brightmoor Power Works', dueOn: '2026-03-27' }
  expect(samplesRequestedMail.link(props)).toEqual({ path: '/sample-requests/r1', welcomesNewcomers: true })
  expect(samplesRequestedMail.write(props, frame)).toEqual({
    subject: 'Brightmoor Power Works asks you for samples: SR-26-ABCDE',
    text: 'Hello Ann Lund,\n\nBrightmoor Power Works asks you for samples with a test report, due on 2026-03-27.\n\nSee what is asked and hand in your report here: http://dotside.test/somewhere\n\nDotside\n',
  })
})

it('tells who was not chosen, without a name or a price', () => {
  const props = { rfqId: 'q1', rfqNumber: 'RFQ-26-ABCDE', customerName: 'Brightmoor Power Works' }
  expect(rfqDecidedMail.link(props)).toEqual({ path: '/enquiries/q1', welcomesNewcomers: true })
  expect(rfqDecidedMail.write(props, frame)).toEqual({
    subject: 'The enquiry RFQ-26-ABCDE has been decided',
    text: 'Hello Ann Lund,\n\nBrightmoor Power Works has decided about RFQ-26-ABCDE, and this time not in favour of your quotation. Thank you for the work you put into it.\nPlease delete the documents of this enquiry as your confidentiality agreement says.\n\nThe enquiry stands here: http://dotside.test/somewhere\n\nDotside\n',
  })
})

it('holds exactly one link in each mail', () => {
  const sample = { requestId: 'r1', number: 'SR-26-ABCDE' }
  const award = { awardId: 'a1', rfqNumber: 'RFQ-26-ABCDE' }
  const order = { orderId: 'o1', number: 'PO-26-ABCDE' }
  const mails = [
    samplesCancelledMail.write(sample, frame),
    sampleReportMail.write({ ...sample, vendorName: 'Quillon Windings' }, frame),
    sampleDisposedMail.write({ ...sample, customerName: 'Brightmoor Power Works' }, frame),
    awardProposedMail.write(award, frame),
    awardDecidedMail.write({ ...award, approved: true }, frame),
    awardDecidedMail.write({ ...award, approved: false }, frame),
    orderPlacedMail.write({ ...order, customerName: 'Brightmoor Power Works', acknowledgeBy: '2026-03-27' }, frame),
    orderAnsweredMail.write({ ...order, vendorName: 'Quillon Windings' }, frame),
  ]
  for (const { subject, text } of mails) {
    expect(text.split(frame.link)).toHaveLength(2)
    expect(`${subject} ${text}`).not.toMatch(/\d+[.,]\d\d|EUR|USD|µH|Ω/)
  }
})
