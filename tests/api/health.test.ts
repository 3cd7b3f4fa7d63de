import { readHealth, readOpenApi } from '#shared/contracts/health'
import { readSession } from '#shared/contracts/people'
import supertest from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp()
})
afterAll(() => test.stop())

describe('health', () => {
  it('says that the outbox is late when no worker has been seen', async () => {
    const answer = await request(test.app, readHealth).expect(200)
    expect(answer.body).toEqual({ status: 'degraded', database: 'ok', outbox: 'late', files: 'ok' })
  })

  it('is well when the worker was seen just now', async () => {
    await test.database.query('UPDATE outbox_health SET seen_at = now()')
    const answer = await request(test.app, readHealth).expect(200)
    expect(answer.body.status).toBe('ok')
  })
})

describe('interface description', () => {
  it('describes every endpoint in OpenAPI 3.1', async () => {
    const { body } = await request(test.app, readOpenApi).expect(200)
    expect(body.openapi).toBe('3.1.0')
    expect(body.paths['/api/sign-in'].post.operationId).toBe('people.signIn')
    expect(body.paths['/api/vendors/{vendorId}'].get.parameters).toEqual([
      expect.objectContaining({ name: 'vendorId', in: 'path', required: true }),
    ])
  })
})

describe('every answer', () => {
  it('carries the headers that keep a browser from loading or framing anything foreign', async () => {
    const { headers } = await request(test.app, readHealth)
    expect(headers['content-security-policy']).toContain("default-src 'self'")
    expect(headers['x-content-type-options']).toBe('nosniff')
    expect(headers['x-powered-by']).toBeUndefined()
  })

  it('answers an unknown address of the interface with not-found, as JSON', async () => {
    const endpoint = { ...readSession, path: '/api/nothing-here' as const }
    const { body, status } = await request(test.app, endpoint)
    expect(status).toBe(404)
    expect(body).toMatchObject({ code: 'not-found', requestId: expect.any(String) })
  })

  it('names no folder of the machine for a file of the pages that is not there', async () => {
    const { body, status } = await supertest(test.app).get('/assets/nothing-here.js')
    expect([status, body.code]).toEqual([404, 'not-found'])
    expect(JSON.stringify(body)).not.toContain('dist')
  })

  it('takes a cookie that cannot be decoded for no session', async () => {
    const { body } = await request(test.app, readSession, { as: 'dotside_session=%ff' }).expect(200)
    expect(body).toEqual({ person: null })
  })
})
