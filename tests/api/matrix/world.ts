import { ROLES, type Role } from '#shared/contracts/endpoint'
import { buildCompany, buildPerson, buildWorld, type TestCompany, type TestPerson } from '../../support/factories'
import type { TestApp } from '../../support/test-app'

export type World = Awaited<ReturnType<typeof buildWorld>>

export interface MatrixWorld {
  test: TestApp
  /** Where the persons of the matrix work; its first vendor is the one that asks, the second its competitor. */
  own: World
  /** Companies that the persons of the matrix have nothing to do with. */
  foreign: World
  /** Stands in every name of the foreign world; put it into what you make there. No answer may hold it. */
  foreignMark: string
  operator: { company: TestCompany; person: TestPerson }
  personOf(role: Role): TestPerson
}

export const FOREIGN_MARK = 'elsewhere-and-nobody-elses'

export async function buildMatrixWorld(test: TestApp): Promise<MatrixWorld> {
  const own = await buildWorld(test)
  const foreign = await buildWorld(test)
  await test.database.query('UPDATE companies SET name = $2 || name WHERE id = ANY ($1)', [companyIds(foreign), FOREIGN_MARK])
  await test.database.query('UPDATE people SET name = $2 || name WHERE id IN (SELECT person_id FROM memberships WHERE company_id = ANY ($1))', [companyIds(foreign), FOREIGN_MARK])
  await test.database.query('UPDATE vendor_relations SET name = $2 || name, notes = $2 WHERE buying_company_id = $1', [foreign.buying.id, FOREIGN_MARK])
  const company = await buildCompany(test, 'operator')
  const operator = { company, person: await buildPerson(test, company, ['operator']) }
  const persons: Record<Role, TestPerson> = { ...own, vendor: own.vendors[0]!.person, operator: operator.person }
  return { test, own, foreign, foreignMark: FOREIGN_MARK, operator, personOf: (role) => persons[role] }
}

const companyIds = (world: World) => [world.buying.id, ...world.vendors.map(({ company }) => company.id)]

export const EVERYBODY: readonly (Role | 'nobody')[] = ['nobody', ...ROLES]
