import type { FeatureExpectations } from './expectation'

export const worklist: FeatureExpectations = {
  listWorklist: { own: () => ({}) },
}
