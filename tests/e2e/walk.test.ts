import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { acknowledge, approve, order, proposeAward } from './support/walk/award'
import { enquire, findItSealed, open, readInvitations, type Enquiry } from './support/walk/enquiry'
import { inviteVendor } from './support/walk/invitation'
import { expectClosedTo, oakhollowDeclines, quillonQuotes, tamsenQuotes } from './support/walk/quotations'
import { askForSamples, disposeOf, reportSamples } from './support/walk/samples'
import { release, specify } from './support/walk/specification'
import { startStage, type Stage } from './support/walk/stage'

let stage: Stage
let rfq: Enquiry
let seal: Awaited<ReturnType<typeof release>>
beforeAll(async () => {
  stage = await startStage()
})
afterAll(() => stage?.stop())

describe('from an operating point to a purchase order', () => {
  it('an administrator makes a new vendor known', () => inviteVendor(stage))

  it('the engineer types a duty, takes the proposal and hands it to check', async () => {
    await specify(await stage.enter(stage.cast.engineer))
  })

  it('the checker answers for what a person must, and releases', async () => {
    seal = await release(stage)
    expect(seal.sha256).toMatch(/^[0-9a-f]{64}$/)
  })

  let tamsenLink: string
  it('the buyer sends the released drawing out; each person of each vendor gets one mail', async () => {
    rfq = await enquire(stage)
    tamsenLink = (await readInvitations(stage, rfq)).tamsen
  })

  it('one vendor comes in by the mail and quotes twice', () => tamsenQuotes(stage, rfq, tamsenLink, seal))

  it('another quotes, and finds nothing of anybody else', () => quillonQuotes(stage, rfq, seal))

  it('a third declines with a reason', () => oakhollowDeclines(stage, rfq))

  it('nobody of the buying side finds a price before the due time', () => findItSealed(stage, rfq))

  it('after the due time the buyer asks and another person opens', () => open(stage, rfq))

  it('the buyer asks for samples, the vendor measures them, quality decides', async () => {
    const { number, link } = await askForSamples(stage, rfq)
    await reportSamples(stage, link)
    await expectClosedTo(stage, stage.cast.quillonSales, new URL(link).pathname)
    await disposeOf(stage, number)
  })

  it('the buyer proposes, another person approves, the order goes out and is acknowledged', async () => {
    const awardPath = await proposeAward(stage, rfq)
    await approve(stage, rfq)
    const number = await order(stage, awardPath, /1\.29/)
    const path = await acknowledge(stage, number, rfq)
    await expectClosedTo(stage, stage.cast.quillonSales, path)
  })
})
