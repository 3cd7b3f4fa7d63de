import type { SearchPreferences } from '#shared/engine/index'
import type { CoreShape } from '#shared/engine/library'
import type { InsulationMethod } from '#shared/engine/specification'

/** What a person narrows a search by; empty lists leave it free. */
export interface SearchWishes {
  shapes: CoreShape[]
  methods: InsulationMethod[]
  materialIds: string[]
}

export const noWishes = (): SearchWishes => ({ shapes: [], methods: [], materialIds: [] })

export const wishedPreferences = ({ shapes, methods, materialIds }: SearchWishes): SearchPreferences => ({
  ...(shapes.length > 0 ? { shapes } : {}),
  ...(methods.length > 0 ? { insulationMethods: methods } : {}),
  ...(materialIds.length > 0 ? { materialIds } : {}),
})

/** A list with one entry put in or taken out. */
export const toggled = <T>(list: readonly T[], entry: T): T[] => (list.includes(entry) ? list.filter((one) => one !== entry) : [...list, entry])
