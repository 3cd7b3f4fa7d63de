import { z } from 'zod'
import { momentSchema } from './common'
import { defineEndpoint } from './endpoint'

/** One thing that waits for the person, or that was done lately. */
export const worklistItemSchema = z.object({
  /** Unique among the person's items, and the same on every call: kind and row. */
  id: z.string(),
  /** What is to be done, such as `confirm-person-change`; each feature names its own. */
  kind: z.string(),
  title: z.string(),
  detail: z.string(),
  state: z.enum(['open', 'done']),
  /** Since when it waits, or when it was done. */
  since: momentSchema,
  dueAt: momentSchema.nullable(),
  /** Where it is done: the client's route by name, with its parameters. */
  link: z.object({ route: z.string(), params: z.record(z.string(), z.string()) }),
})
export type WorklistItem = z.infer<typeof worklistItemSchema>

export const listWorklist = defineEndpoint({
  method: 'GET',
  path: '/api/worklist',
  summary: 'What waits for the person who asks, and what was done in the last seven days',
  access: 'signed-in',
  response: z.object({
    items: z.array(worklistItemSchema),
    /** The server's time, so that overdue is decided by one clock. */
    now: momentSchema,
  }),
})
