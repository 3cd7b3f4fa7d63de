import type { CoreShape } from '../library'
import type { InsulationMethod } from '../specification'
import type { ProposalPreferences } from '../propose'

/** What steers a search; everything left out is free. */
export interface SearchPreferences extends Partial<ProposalPreferences> {
  /** Ways of keeping the sides apart that are tried; the requirement sheet's own unless said. */
  insulationMethods?: readonly InsulationMethod[]
  /** Materials that are tried, by id; all power grades whose loss is known at the frequency unless said. */
  materialIds?: readonly string[]
  /** Rows that the company likes, as `core/etd-34`: they come first among equals. */
  preferredRows?: readonly string[]
  /** Rows that lie in the store, as `former/etd-34-14pin`. */
  stockedRows?: readonly string[]
  /** Only cores and formers that lie in the store. */
  onlyStocked?: boolean
  /** How many candidates are evaluated in full. */
  finalists?: number
}

export const SEARCHED_SHAPES: readonly CoreShape[] = ['ETD', 'E', 'EFD', 'ER', 'PQ', 'RM', 'EP', 'P']
export const DEFAULT_FINALISTS = 40
