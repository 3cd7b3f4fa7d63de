import { report } from './context'
import type { Context } from './context'
import { rowUses, unverifiedFields } from './library-use'
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
  })
  reportUses(context)
}

/** Rows that nobody's data sheet stands behind, and fields in use that no source gives. */
function reportUses(context: Context): void {
  for (const use of rowUses(context)) {
    const { row, path } = use
    const unverified = unverifiedFields(use).join(', ')
    if (row.confidence === 'generic') report(context, 'generic-row-used', 'warning', path, { row: row.name, source: row.source })
    else if (unverified !== '') report(context, 'generic-row-used', 'warning', path, { row: row.name, unverified, source: row.source })
  }
}
