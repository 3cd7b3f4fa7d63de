import type { LibraryRow } from '../library'
import type { LibraryReference } from '../specification'
import { report } from './context'
import type { Context } from './context'
import { buildWire } from './lookup'

/** What the library lacks for this document, and which of its rows nobody has verified. */
export function reportLibrary(context: Context): void {
  const { specification, core, former, material, index } = context
  if (specification.core.core.value && !core) report(context, 'core-not-in-library', 'error', 'core.core', { id: specification.core.core.value.id })
  if (specification.former.former.value && !former) report(context, 'former-not-in-library', 'error', 'former.former', { id: specification.former.former.value.id })
  if (specification.core.material.value && !material) report(context, 'material-not-in-library', 'error', 'core.material', { id: specification.core.material.value.id })
  if (core && former && former.coreId !== core.id) report(context, 'former-belongs-to-another-core', 'error', 'former.former', { former: former.name, core: core.name })

  specification.windings.forEach((winding, position) => {
    const path = `windings.${position}.wire`
    const wire = index.find('wire', winding.wire.wire)
    if (!wire) report(context, 'wire-not-in-library', 'error', path, { winding: winding.name, id: winding.wire.wire.id })
    else if (!buildWire(index, winding)) report(context, 'wire-overall-diameter-unknown', 'error', path, { winding: winding.name, wire: wire.name })
    reportGeneric(context, wire, path)
  })
  reportGeneric(context, core, 'core.core')
  reportGeneric(context, former, 'former.former')
  reportGeneric(context, material, 'core.material')
  reportTapes(context)
}

function reportTapes(context: Context): void {
  const seen = new Set<string>()
  context.specification.sequence.forEach((step, position) => {
    const reference: LibraryReference | null = step.kind === 'tape' || step.kind === 'margin' || step.kind === 'core-tape' ? step.tape : step.kind === 'winding' ? step.interlayerTape : null
    if (!reference || seen.has(`${reference.id} ${reference.version}`)) return
    seen.add(`${reference.id} ${reference.version}`)
    reportGeneric(context, context.index.find('tape', reference), `sequence.${position}.tape`)
  })
}

function reportGeneric(context: Context, row: LibraryRow | null, path: string): void {
  if (!row) return
  if (row.confidence === 'generic') report(context, 'generic-row-used', 'warning', path, { row: row.name, source: row.source })
  else if (row.unverified.length > 0) report(context, 'generic-row-used', 'note', path, { row: row.name, unverified: row.unverified.join(', '), source: row.source })
}
