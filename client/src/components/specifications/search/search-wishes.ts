import type { SearchPreferences } from '#shared/engine/index'
import type { CoreShape } from '#shared/engine/library'
import type { InsulationMethod } from '#shared/engine/specification'

/** What a person narrows a search by; empty lists leave it free. */
export interface SearchWishes {
  shapes: CoreShape[]
  methods: InsulationMethod[]
  materialIds: string[]
  /** Only cores and coil formers in the company's store. */
  onlyStocked: boolean
}

export const noWishes = (): SearchWishes => ({ shapes: [], methods: [], materialIds: [], onlyStocked: false })

export const wishedPreferences = ({ shapes, methods, materialIds, onlyStocked }: SearchWishes): SearchPreferences => ({
  ...(shapes.length > 0 ? { shapes } : {}),
  ...(methods.length > 0 ? { insulationMethods: methods } : {}),
  ...(materialIds.length > 0 ? { materialIds } : {}),
  ...(onlyStocked ? { onlyStocked } : {}),
})

/** A list with one entry put in or taken out. */
export const toggled = <T>(list: readonly T[], entry: T): T[] => (list.includes(entry) ? list.filter((one) => one !== entry) : [...list, entry])
