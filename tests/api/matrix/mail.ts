import { randomUUID } from 'node:crypto'
import type { TestPerson } from '../../support/factories'
import type { FeatureExpectations } from './expectation'
import type { MatrixWorld } from './world'

/** An undeliverable mail that the person's company caused. */
async function undeliverable({ test }: MatrixWorld, by: TestPerson): Promise<{ mailId: string }> {
  const [eventId, mailId] = [randomUUID(), randomUUID()]
  await test.database.query("INSERT INTO mail_events (id, company_id, to_person_id, template, props) VALUES ($1, $2, $3, 'invitation', '{}')", [eventId, by.companyId, by.personId])
  await test.database.query(
    `INSERT INTO outbox_mails (id, event_id, person_id, company_id, template, address, message_id, state, next_attempt_at)
     VALUES ($1, $2, $3, $4, 'invitation', $5, $6, 'undeliverable', now())`,
    [mailId, eventId, by.personId, by.companyId, by.email, `<${mailId}@dotside.test>`],
  )
  return { mailId }
}

export const mail: FeatureExpectations = {
  listUndeliverable: { own: async (world, person) => (await undeliverable(world, person), {}) },
  retryMail: {
    own: async (world, person) => ({ params: await undeliverable(world, person) }),
    // The operator looks after every company's mail, so that only an absent one is not found.
    foreign: async (world, person) =>
      person.companyKind === 'operator' ? { params: { mailId: randomUUID() } } : { params: await undeliverable(world, world.foreign.admin) },
  },
  readMailHealth: { own: () => ({}) },
}
