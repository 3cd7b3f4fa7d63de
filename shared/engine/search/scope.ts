import { indexLibrary } from '../evaluate/lookup'
import type { Library, MaterialRow } from '../library'
import type { SearchInput } from '../propose/candidate'
import { commonModeGrades, powerGrades } from '../propose/material'
import type { Plan } from '../propose/plan'
import { DEFAULT_PREFERENCES } from '../propose/preferences'
import { isTooHigh, sizesOf } from '../propose/search'
import type { Size } from '../propose/search'
import type { InsulationMethod, RequirementSheet } from '../specification'
import { rejectingCheck } from './candidates'
import type { RejectedCore } from './candidates'
import { SEARCHED_SHAPES } from './preferences'
import type { SearchPreferences } from './preferences'

/** Rise allowed where the requirement names none, K: class 130 above 40 °C. */
const USUAL_RISE_K = 75

/** All that one search goes by. */
export interface Scope {
  requirement: RequirementSheet
  library: Library
  plan: Plan
  wishes: SearchPreferences
  sizes: Size[]
  tooHigh: RejectedCore[]
  materials: MaterialRow[]
  methods: readonly InsulationMethod[]
  inputOf: (material: MaterialRow, of?: { method?: InsulationMethod; densityShare?: number; turnShares?: readonly number[] }) => SearchInput
  mostRiseK: number
}

export function scopeOf(requirement: RequirementSheet, library: Library, { plan, wishes }: { plan: Plan; wishes: SearchPreferences }): Scope {
  const index = indexLibrary(library)
  const preferences = { ...DEFAULT_PREFERENCES, shapes: SEARCHED_SHAPES, ...wishes }
  const stocked = new Set(wishes.stockedRows)
  const inStore = ({ core, former }: Size) => stocked.has(`core/${core.id}`) && stocked.has(`former/${former.id}`)
  const all = sizesOf(library, preferences).filter((size) => !wishes.onlyStocked || inStore(size))
  const tooHigh = all.filter((size) => isTooHigh(size, requirement))
  return {
    requirement,
    library,
    plan,
    wishes,
    sizes: all.filter((size) => !tooHigh.includes(size)),
    tooHigh: tooHigh.map((size) => rejectedCore(size, rejectingCheck('height', null))),
    materials: materialsFor(library, plan, wishes),
    methods: wishes.insulationMethods ?? [requirement.insulationMethod],
    mostRiseK: requirement.permittedRiseK ?? USUAL_RISE_K,
    inputOf: (material, { method = requirement.insulationMethod, densityShare = 1, turnShares } = {}) => ({
      requirement: { ...requirement, insulationMethod: method, targetCurrentDensityAPerMm2: requirement.targetCurrentDensityAPerMm2 * densityShare },
      plan,
      material,
      library,
      index,
      preferences,
      ...(turnShares ? { turnShares } : {}),
    }),
  }
}

function materialsFor(library: Library, { frequencyHz, materialUse }: Plan, { materialIds, materialId }: SearchPreferences): MaterialRow[] {
  const asked = materialIds ?? (materialId ? [materialId] : null)
  if (asked) return library.materials.filter(({ id }) => asked.includes(id))
  return materialUse === 'common-mode' ? commonModeGrades(library) : powerGrades(library, frequencyHz).grades
}

export const rejectedCore = ({ core, former }: Size, check: string): RejectedCore => ({ core: core.name, former: former.name, shape: core.shape, check })
