import { DrizzleQueryError } from 'drizzle-orm'
import { expect, it } from 'vitest'
import { createLogger } from './logger'

it('logs a failed query without its parameters, with the code of its cause', () => {
  const lines: string[] = []
  const cause = Object.assign(new Error('new row violates row-level security policy'), { code: '42501' })
  createLogger((line) => lines.push(line)).error('Request failed', { error: new DrizzleQueryError('insert into quotes values ($1)', ['1.290000', 'a@vendor.example'], cause) })
  expect(lines[0]).toContain('insert into quotes')
  expect(lines[0]).toContain('42501')
  expect(lines[0]).not.toContain('1.290000')
  expect(lines[0]).not.toContain('vendor.example')
})
