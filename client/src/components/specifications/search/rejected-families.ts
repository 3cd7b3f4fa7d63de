import type { RejectedCore } from '#shared/engine/index'

export interface RejectedFamily {
  shape: RejectedCore['shape']
  check: string
  formers: string[]
}

/** Rejected cores by family and by the check that rejected them, families in the order they come. */
export function rejectedFamilies(rejected: readonly RejectedCore[]): RejectedFamily[] {
  const groups = new Map<string, RejectedFamily>()
  for (const { shape, check, former } of rejected) {
    const key = `${shape} ${check}`
    const group = groups.get(key) ?? { shape, check, formers: [] }
    groups.set(key, { ...group, formers: [...group.formers, former] })
  }
  return [...groups.values()].sort((one, other) => (one.shape < other.shape ? -1 : one.shape > other.shape ? 1 : one.check < other.check ? -1 : 1))
}
