import type { Actor, Transaction } from '#server/db/as-actor'
import { partRows } from '#server/db/schema/index'
import type { listParts as contract, PartFlags, PartSummary } from '#shared/contracts/parts'
import type { QueryOf, ResponseOf } from '#shared/contracts/endpoint'
import type { AnyLibraryRow } from '#shared/engine/library'
import { eq } from 'drizzle-orm'
import { flagsOfKind, NO_FLAGS } from './part-flags'
import { currentVersions, type PartRecord } from './visible-rows'

type Query = QueryOf<typeof contract>

/**
 * One kind, filtered and sorted. A kind holds hundreds of rows, of which only the version for new work counts, so
 * that filtering comes after that choice: an older version must not answer a search that the newest does not.
 */
export async function listParts(tx: Transaction, actor: Actor, query: Query): Promise<ResponseOf<typeof contract>> {
  const all = await currentVersions(tx, actor, eq(partRows.kind, query.kind))
  const flags = await flagsOfKind(tx, actor, query.kind)
  const found = all.filter((record) => matches(record, query)).sort(bySize)
  return {
    total: found.length,
    rows: found.slice(query.offset, query.offset + query.limit).map((record) => summaryOf(record, flags.get(`${record.kind}/${record.partId}`) ?? NO_FLAGS)),
    families: familiesOf(all),
  }
}

function matches(record: PartRecord, { search, family, confidence, origin }: Query): boolean {
  if (family !== undefined && record.family !== family) return false
  if (confidence !== undefined && record.confidence !== confidence) return false
  if (origin !== undefined && (record.companyId === null ? 'shared' : 'company') !== origin) return false
  const { name, id, source, note } = record.row
  const text = plain([name, id, source, note, record.family].join(' '))
  return search.split(/\s+/).every((word) => text.includes(plain(word)))
}

/** Case, the multiplication sign and the spelling of µ make no difference to a search. */
const plain = (text: string) => text.normalize('NFKC').toLowerCase().replaceAll('×', 'x')

const bySize = (a: PartRecord, b: PartRecord) => (a.sortKey < b.sortKey ? -1 : a.sortKey > b.sortKey ? 1 : 0)

function familiesOf(records: readonly PartRecord[]): { family: string; count: number }[] {
  const counts = new Map<string, number>()
  for (const { family } of records) counts.set(family, (counts.get(family) ?? 0) + 1)
  return [...counts].map(([family, count]) => ({ family, count })).sort((a, b) => a.family.localeCompare(b.family))
}

function summaryOf(record: PartRecord, flags: PartFlags): PartSummary {
  const { kind, id, version, name, source, confidence, unverified } = record.row
  return {
    kind,
    id,
    version,
    name,
    family: record.family,
    figures: figuresOf(record.row),
    source,
    confidence,
    unverified: unverified.length,
    origin: record.companyId === null ? 'shared' : 'company',
    flags,
  }
}

/** The figures of a list line, by the path of the field. */
function figuresOf(row: AnyLibraryRow): Record<string, number | null> {
  switch (row.kind) {
    case 'core':
      return { effectiveAreaMm2: row.effectiveAreaMm2, effectiveLengthMm: row.effectiveLengthMm, effectiveVolumeMm3: row.effectiveVolumeMm3, massG: row.massG }
    case 'former':
      return { windingWidthMm: row.windingWidthMm, windingHeightMm: row.windingHeightMm, pins: row.pins.length }
    case 'material':
      return { initialPermeability: row.initialPermeability, fluxDensityT: row.saturation.at(-1)?.fluxDensityT ?? null, temperatureC: row.saturation.at(-1)?.temperatureC ?? null, curieC: row.curieC }
    case 'wire':
      return { conductorMm: row.conductorMm, copperAreaMm2: row.copperAreaMm2, 'overallMm.enamel-grade-2': row.overallMm['enamel-grade-2'], 'overallMm.triple-insulated': row.overallMm['triple-insulated'] }
    case 'tape':
      return { thicknessMm: row.thicknessMm, thermalClassC: row.thermalClassC, layerWithstandVRms: row.layerWithstandVRms }
    case 'sleeve':
      return { boreMm: row.boreMm, wallMm: row.wallMm, thermalClassC: row.thermalClassC, withstandVRms: row.withstandVRms }
  }
}
