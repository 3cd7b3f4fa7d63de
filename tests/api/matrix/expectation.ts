import type { Role } from '#shared/contracts/endpoint'
import type { TestPerson } from '../../support/factories'
import type { CallParts } from '../../support/test-app'
import type { MatrixWorld } from './world'

type Parts = CallParts | Promise<CallParts>

/** What one endpoint answers to each role. A role that the contract does not name gets 403, nobody gets 401. */
export interface Expectation {
  /**
   * A call about an object that the person's company owns (or, for a vendor, was given). Made anew for every
   * call, so that calls which change something do not meet each other. `as` replaces the person's session.
   */
  own(world: MatrixWorld, person: TestPerson): Parts
  /** Status of that call; 200 unless said, for all roles or for single ones. */
  status?: number | Partial<Record<Role | 'nobody', number>>
  /**
   * The same call about an object of `world.foreign` (or of a competitor). It answers 404, in the same words as
   * for an object that does not exist. Needed wherever the path has a parameter, unless `shared` says why not.
   */
  foreign?(world: MatrixWorld, person: TestPerson): Parts
  /** Why the objects of this endpoint are everybody's. */
  shared?: string
}

/** Keyed by the endpoint's name in its contract file. */
export type FeatureExpectations = Readonly<Record<string, Expectation>>
