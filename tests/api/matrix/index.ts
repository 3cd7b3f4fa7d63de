import { audit } from './audit'
import { awards } from './awards'
import type { Expectation, FeatureExpectations } from './expectation'
import { health } from './health'
import { mail } from './mail'
import { orders } from './orders'
import { parts } from './parts'
import { people } from './people'
import { samples } from './samples'
import { specifications } from './specifications'
import { quotes } from './quotes'
import { rfqs } from './rfqs'
import { worklist } from './worklist'

/** One line per feature, under the feature's name in `shared/contracts/index.ts`. */
const FEATURES: Readonly<Record<string, FeatureExpectations>> = { health, people, parts, specifications, rfqs, quotes, samples, awards, orders, mail, audit, worklist }

/** Keyed like the endpoints: `people.signIn`. */
export const EXPECTATIONS: ReadonlyMap<string, Expectation> = new Map(
  Object.entries(FEATURES).flatMap(([feature, expectations]) => Object.entries(expectations).map(([key, value]) => [`${feature}.${key}`, value] as const)),
)
