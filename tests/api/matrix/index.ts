import { audit } from './audit'
import type { Expectation, FeatureExpectations } from './expectation'
import { health } from './health'
import { mail } from './mail'
import { parts } from './parts'
import { people } from './people'

/** One line per feature, under the feature's name in `shared/contracts/index.ts`. */
const FEATURES: Readonly<Record<string, FeatureExpectations>> = { health, people, parts, mail, audit }

/** Keyed like the endpoints: `people.signIn`. */
export const EXPECTATIONS: ReadonlyMap<string, Expectation> = new Map(
  Object.entries(FEATURES).flatMap(([feature, expectations]) => Object.entries(expectations).map(([key, value]) => [`${feature}.${key}`, value] as const)),
)
