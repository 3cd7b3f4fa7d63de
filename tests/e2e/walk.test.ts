import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { acknowledge, approve, order, proposeAward } from './support/walk/award'
import { enquire, open, quoteAll, type Rfq } from './support/walk/enquiry'
import { inviteVendor } from './support/walk/invitation'
import { askForSamples, disposeOf, reportSamples } from './support/walk/samples'
import { release, specify } from './support/walk/specification'
import { startStage, type Stage } from './support/walk/stage'

let stage: Stage
let rfq: Rfq
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
    expect((await release(stage)).sha256).toMatch(/^[0-9a-f]{64}$/)
  })

  it('quotations', async () => {
    rfq = await enquire(stage)
    await quoteAll(stage, rfq)
    await open(stage, rfq)
  })

  it('the buyer asks for samples, the vendor measures them, quality decides', async () => {
    const { number, link } = await askForSamples(stage, rfq)
    await reportSamples(stage, link)
    await disposeOf(stage, number)
  })

  it('the buyer proposes, another person approves, the order goes out and is acknowledged', async () => {
    const awardPath = await proposeAward(stage, rfq)
    await approve(stage, rfq)
    const number = await order(stage, awardPath, /1\.29/)
    await acknowledge(stage, number, rfq)
  })
})
