import { describe } from 'vitest'
import { describeMatrix } from './matrix/describe-matrix'

describe('access with row security open, so that the policies in code hold alone', () =>
  describeMatrix(async ({ test }) => {
    const tables = await test.database.query<{ name: string }>("SELECT format('%I', relname) AS name FROM pg_class WHERE relnamespace = 'public'::regnamespace AND relkind = 'r'")
    for (const { name } of tables) await test.database.query(`ALTER TABLE ${name} NO FORCE ROW LEVEL SECURITY, DISABLE ROW LEVEL SECURITY`)
  }))
