import type { LibraryReference } from '../specification'
import type { Context } from './context'

export interface SystemMember {
  name: string
  classC: number
}

/** Every material of the insulation system with its thermal class: wires, tapes, sleeves, former and resin. */
export function systemMembers(context: Context): SystemMember[] {
  const { specification, former, index } = context
  const members = new Map<string, number>()
  const add = (name: string, classC: number | null | undefined) => {
    if (classC != null && classC > 0) members.set(name, classC)
  }
  for (const { name, wire } of specification.windings) add(`wire of ${name}`, wire.thermalClassC)
  if (former) add(former.material, former.thermalClassC)
  const tape = (reference: LibraryReference | null) => {
    const row = index.find('tape', reference)
    if (row) add(row.name, row.thermalClassC)
  }
  const sleeve = (reference: LibraryReference | undefined) => {
    const row = index.find('sleeve', reference ?? null)
    if (row) add(row.name, row.thermalClassC)
  }
  for (const step of specification.sequence) {
    if (step.kind === 'tape' || step.kind === 'margin' || step.kind === 'core-tape') tape(step.tape)
    if (step.kind === 'sleeve') sleeve(step.sleeve)
    if (step.kind === 'winding') {
      tape(step.interlayerTape)
      sleeve(step.startSleeve?.sleeve)
      sleeve(step.finishSleeve?.sleeve)
    }
  }
  if (specification.impregnation.process.value !== 'none') add(specification.impregnation.resin.value ?? 'resin', specification.impregnation.thermalClassC.value)
  return [...members].map(([name, classC]) => ({ name, classC }))
}
