import * as audit from './audit'
import * as awards from './awards'
import { isEndpoint, type Endpoint } from './endpoint'
import * as health from './health'
import * as mail from './mail'
import * as orders from './orders'
import * as parts from './parts'
import * as people from './people'
import * as quotes from './quotes'
import * as rfqs from './rfqs'
import * as samples from './samples'
import * as specifications from './specifications'
import * as worklist from './worklist'

/** One line per feature; every endpoint such a file exports is documented and tested for access. */
const FEATURES = { health, people, parts, specifications, rfqs, quotes, samples, awards, orders, mail, audit, worklist }

export interface NamedEndpoint {
  /** Feature and export, such as `people.signIn`: the operation's identifier in the documentation. */
  name: string
  feature: string
  endpoint: Endpoint
}

/** Every endpoint there is. The server mounts all of them, the access matrix expects something of each. */
export const allEndpoints: readonly NamedEndpoint[] = Object.entries(FEATURES).flatMap(([feature, contract]) =>
  Object.entries(contract).flatMap(([key, value]: [string, unknown]) =>
    isEndpoint(value) ? [{ name: `${feature}.${key}`, feature, endpoint: value }] : [],
  ),
)
