import type { ReleasedSpecification } from '#shared/engine/released'
import type { ExpectedRow } from '#shared/measurement/model'

/** The test table of a release, read from the very bytes that its hash is of. */
export function expectedRows(specification: Buffer): ExpectedRow[] {
  const { tests } = (JSON.parse(specification.toString('utf8')) as ReleasedSpecification).specification
  return tests.map(({ id, symbol, characteristic, unit, minimum, nominal, maximum, levelV, temperatureC, extent, record }) => ({
    ...{ id, symbol, characteristic, unit, minimum, nominal, maximum, levelV, temperatureC, extent, record },
  }))
}
