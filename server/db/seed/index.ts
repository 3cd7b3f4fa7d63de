import { parseConfig } from '#server/config'
import { closeContext, createContext, type Context } from '#server/context'
import { asWorker } from '#server/db/as-actor'
import { seedSteps } from '#server/db/schema/index'
import { eq, sql } from 'drizzle-orm'
import { chmod, mkdir, writeFile } from 'node:fs/promises'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { makeFirstLinks } from './first-links'
import { DEMO_PASSWORD, DEMO_PEOPLE, seedPeople } from './people'
import { seedRfqs } from './rfqs'
import { seedSamples } from './samples'
import { seedSpecifications } from './specifications/index'

export interface SeedStep {
  name: string
  /** Acts as the demo's people (`demoActor`), through the services, with dates relative to now. */
  run(ctx: Context): Promise<void>
}

/** In this order, each once. A step may build on those before it. */
export const DEMO_STEPS: readonly SeedStep[] = [
  { name: 'people', run: seedPeople },
  { name: 'specifications', run: seedSpecifications },
  { name: 'rfqs', run: seedRfqs },
  { name: 'samples', run: seedSamples },
]

export async function seedDemo(ctx: Context): Promise<void> {
  for (const { name, run } of DEMO_STEPS) {
    const isDone = await asWorker(ctx, (tx) => tx.$count(seedSteps, eq(seedSteps.name, name)))
    if (isDone) continue
    await run(ctx)
    await asWorker(ctx, (tx) => tx.insert(seedSteps).values({ name, doneAt: sql`app_now()` }))
  }
}

/** What the start block prints. Readable only by the owner of the folder, since links and passwords stand in it. */
async function writeSignIns(dataDir: string, content: unknown): Promise<void> {
  const file = path.join(dataDir, 'sign-ins.json')
  await mkdir(dataDir, { recursive: true })
  await writeFile(file, `${JSON.stringify(content, null, 2)}\n`, { mode: 0o600 })
  await chmod(file, 0o600)
}

async function seed(ctx: Context): Promise<void> {
  const { DEMO, DATA_DIR } = ctx.config
  if (!DEMO) return writeSignIns(DATA_DIR, await makeFirstLinks(ctx))
  await seedDemo(ctx)
  const demo = DEMO_PEOPLE.map(({ shownAs, name, email, companyName }) => ({ role: shownAs, name: `${name}, ${companyName}`, email, password: DEMO_PASSWORD }))
  await writeSignIns(DATA_DIR, { demo })
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const ctx = createContext(parseConfig(process.env))
  await seed(ctx).finally(() => closeContext(ctx))
}
