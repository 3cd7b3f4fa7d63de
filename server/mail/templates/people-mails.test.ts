import { describe, expect, it } from 'vitest'
import { formatMoment } from '../compose-mail'
import { messageIdOf } from '../expand-mail'
import { addressProofMail } from './address-proof'
import { changeDoneMail } from './change-done'
import { changeRequestedMail } from './change-requested'
import { invitationMail } from './invitation'
import { passwordResetMail } from './password-reset'
import { passwordSetMail } from './password-set'
import type { MailFrame } from './template'
import { vendorInvitationMail } from './vendor-invitation'

const frame: MailFrame = {
  link: 'https://dotside.example/x',
  recipientName: 'Edda Lowe',
  linkValidUntil: 'Tue, 8 Dec 2026, 17:00 (Europe/Berlin, GMT+01:00)',
  moment: (iso) => formatMoment(iso, 'Europe/Berlin'),
}

const body = (...lines: string[]) => ['Hello Edda Lowe,', '', ...lines, '', 'Dotside', ''].join('\n')

describe('mails about people', () => {
  it('invites', () => {
    expect(invitationMail.write({ companyName: 'Brightmoor Power Works' }, frame)).toEqual({
      subject: 'Brightmoor Power Works invites you to Dotside',
      text: body(
        'Brightmoor Power Works has invited you to work with it in Dotside, where wound components are specified, quoted and ordered.',
        '',
        'Set your password here: https://dotside.example/x',
        'The link works once and until Tue, 8 Dec 2026, 17:00 (Europe/Berlin, GMT+01:00).',
      ),
    })
  })

  it('invites a vendor, and names an end only when the link has one', () => {
    const { subject, text } = vendorInvitationMail.write({ buyingCompanyName: 'Brightmoor Power Works' }, { ...frame, linkValidUntil: '' })
    expect(subject).toBe('Brightmoor Power Works invites you as a vendor')
    expect(text).toBe(body('Brightmoor Power Works would like to send you enquiries for wound components.', '', 'Accept here: https://dotside.example/x'))
    expect(vendorInvitationMail.link({ buyingCompanyName: '' })).toEqual({ path: '/customers', welcomesNewcomers: true })
  })

  it('sends a link for a new password', () => {
    expect(passwordResetMail.write({}, frame).text).toBe(
      body(
        'Somebody, probably you, has asked for a new password. If it was not you, nothing has to be done.',
        '',
        'Set it here: https://dotside.example/x',
        'The link works once and until Tue, 8 Dec 2026, 17:00 (Europe/Berlin, GMT+01:00).',
      ),
    )
  })

  it('tells that a password was set, with date and zone', () => {
    expect(passwordSetMail.write({ at: '2026-12-01T16:00:00.000Z' }, frame).text).toBe(
      body(
        'Your password was set on Tue, 1 Dec 2026, 17:00 (Europe/Berlin, GMT+01:00); every session has ended.',
        '',
        'If it was not you, ask for a new one here: https://dotside.example/x',
      ),
    )
  })

  it('asks a second person', () => {
    expect(changeRequestedMail.write({ personName: 'Joris Pell', kind: 'roles' }, frame)).toEqual({
      subject: 'A change waits for a second person',
      text: body('A change of the roles of Joris Pell waits for a second person.', '', 'Decide here: https://dotside.example/x'),
    })
  })

  it('tells the person concerned', () => {
    expect(changeDoneMail.write({ kind: 'removal', at: '2026-06-01T16:00:00.000Z' }, frame)).toEqual({
      subject: 'Your access has been ended',
      text: body('Your access has been ended on Mon, 1 Jun 2026, 18:00 (Europe/Berlin, GMT+02:00); every session has ended.', '', 'Dotside is here: https://dotside.example/x'),
    })
  })

  it('proves a new address', () => {
    expect(addressProofMail.link({ changeId: 'c' })).toEqual({ singleUse: 'address-change', validHours: 48, changeId: 'c' })
    expect(addressProofMail.write({ changeId: 'c' }, frame).text).toContain('Confirm it here: https://dotside.example/x\n')
  })
})

describe('formatMoment', () => {
  it.each([
    ['2026-12-01T16:00:00Z', 'UTC', 'Tue, 1 Dec 2026, 16:00 (UTC, GMT+00:00)'],
    ['2026-12-01T23:30:00Z', 'Asia/Kolkata', 'Wed, 2 Dec 2026, 05:00 (Asia/Kolkata, GMT+05:30)'],
    ['2026-03-29T01:00:00Z', 'Europe/Berlin', 'Sun, 29 Mar 2026, 03:00 (Europe/Berlin, GMT+02:00)'],
  ])('writes %s in %s', (iso, zone, text) => {
    expect(formatMoment(iso, zone)).toBe(text)
  })
})

describe('messageIdOf', () => {
  it('is the same for the same event and recipient, and another for another', () => {
    const from = 'Dotside <no-reply@dotside.example>'
    expect(messageIdOf(from, 'event', 'person')).toBe(messageIdOf(from, 'event', 'person'))
    expect(messageIdOf(from, 'event', 'person')).toMatch(/^<[0-9a-f]{40}@dotside\.example>$/)
    expect(messageIdOf(from, 'event', 'other')).not.toBe(messageIdOf(from, 'event', 'person'))
  })
})
