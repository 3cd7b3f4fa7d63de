import { indexLibrary } from '../evaluate/lookup'
import type { CoreRow, FormerRow, Library, MaterialRow } from '../library'
import type { SearchInput } from '../propose/candidate'
import type { Plan } from '../propose/plan'
import { DEFAULT_PREFERENCES } from '../propose/preferences'
import { isHollow } from '../propose/search'
import type { InsulationMethod, RequirementSheet } from '../specification'
import { rejectingCheck } from './candidates'
import type { RejectedCore } from './candidates'
import { SEARCHED_SHAPES } from './preferences'
import type { SearchPreferences } from './preferences'

/** Rise allowed where the requirement names none, K: class 130 above 40 °C. */
const USUAL_RISE_K = 75

/** A core with one of its coil formers. */
export interface Size {
  core: CoreRow
  former: FormerRow
}

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
  const all = library.formers
    .flatMap((former): Size[] => {
      const core = library.cores.find(({ id }) => id === former.coreId)
      if (!core || isHollow(core) || !preferences.shapes.includes(core.shape) || (preferences.coreId !== null && core.id !== preferences.coreId)) return []
      return wishes.onlyStocked && !(stocked.has(`core/${core.id}`) && stocked.has(`former/${former.id}`)) ? [] : [{ core, former }]
    })
    .sort((one, other) => one.core.effectiveVolumeMm3 - other.core.effectiveVolumeMm3 || (one.former.id < other.former.id ? -1 : 1))
  const limitMm = requirement.maximumHeightMm
  const isTooHigh = ({ former }: Size) => limitMm !== null && former.envelopeMm.height + 0.5 > limitMm
  return {
    requirement,
    library,
    plan,
    wishes,
    sizes: all.filter((size) => !isTooHigh(size)),
    tooHigh: all.filter(isTooHigh).map((size) => rejectedCore(size, rejectingCheck('height', null))),
    materials: materialsFor(library, plan.frequencyHz, wishes),
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

function materialsFor({ materials }: Library, frequencyHz: number, { materialIds, materialId }: SearchPreferences): MaterialRow[] {
  const asked = materialIds ?? (materialId ? [materialId] : null)
  if (asked) return materials.filter(({ id }) => asked.includes(id))
  const power = materials.filter(({ use, saturation, lossFits }) => use === 'power' && lossFits.length > 0 && saturation.some(({ temperatureC }) => temperatureC >= 100))
  const within = power.filter(({ lossFits }) => lossFits.some(({ minimumHz, maximumHz }) => frequencyHz >= minimumHz && frequencyHz <= maximumHz))
  return within.length > 0 ? within : power
}

export const rejectedCore = ({ core, former }: Size, check: string): RejectedCore => ({ core: core.name, former: former.name, shape: core.shape, check })
