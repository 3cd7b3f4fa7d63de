import { z } from 'zod'
import { idSchema, momentSchema } from './common'
import { defineEndpoint } from './endpoint'

export const undeliverableMailSchema = z.object({
  id: idSchema,
  template: z.string(),
  address: z.string(),
  attempts: z.int(),
  lastError: z.string(),
  createdAt: momentSchema,
})

export const listUndeliverable = defineEndpoint({
  method: 'GET',
  path: '/api/mail/undeliverable',
  summary: 'Mails of the own company that could not be delivered',
  access: ['buyer', 'admin', 'vendor', 'operator'],
  response: z.array(undeliverableMailSchema),
})

export const retryMail = defineEndpoint({
  method: 'POST',
  path: '/api/mail/:mailId/retry',
  summary: 'Try an undeliverable mail again',
  access: ['buyer', 'admin', 'vendor', 'operator'],
  params: z.strictObject({ mailId: idSchema }),
})

export const readMailHealth = defineEndpoint({
  method: 'GET',
  path: '/api/mail/health',
  summary: 'How many mails wait, were sent and could not be delivered; no content',
  access: ['operator'],
  response: z.object({ waiting: z.int(), sent: z.int(), undeliverable: z.int(), oldestWaitingSince: momentSchema.nullable() }),
})
