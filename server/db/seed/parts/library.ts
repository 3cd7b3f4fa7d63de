import type { Library } from '#shared/engine/library'
import { shippedCores } from './cores'
import { shippedFormers } from './formers'
import { shippedMaterials } from './materials'
import { shippedSleeves, shippedTapes } from './tapes'
import { shippedWires } from './wires'

/** The rows that every installation starts with, version 1 of each. Pure: no file and no database is read. */
export function shippedLibrary(): Library {
  const cores = shippedCores()
  return {
    cores,
    formers: shippedFormers(cores),
    materials: shippedMaterials(),
    wires: shippedWires(),
    tapes: shippedTapes(),
    sleeves: shippedSleeves(),
  }
}
