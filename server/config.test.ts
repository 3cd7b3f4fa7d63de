import { describe, expect, it } from 'vitest'
import { parseConfig } from './config'

const env = { DATABASE_AUTH_URL: 'postgres://a@h/d', DATABASE_APP_URL: 'postgres://b@h/d' }

describe('parseConfig', () => {
  it('fills in what has a usual value', () => {
    expect(parseConfig(env)).toMatchObject({ PORT: 3000, DEMO: true, UPLOAD_LIMIT_BYTES: 26_214_400 })
  })

  it('names every variable that cannot be used, in one sentence', () => {
    expect(() => parseConfig({ ...env, PORT: 'eighty', SMTP_URL: 'mail.example', DATABASE_APP_URL: undefined })).toThrow(
      /^The configuration cannot be used\. PORT: .*; DATABASE_APP_URL: .*; SMTP_URL: is not an address like smtp:\/\/host:port$/,
    )
  })
})
