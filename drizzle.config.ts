import { defineConfig } from 'drizzle-kit'

export default defineConfig({
  dialect: 'postgresql',
  schema: './server/db/schema',
  out: './migrations',
  migrations: { prefix: 'timestamp' },
  strict: true,
})
