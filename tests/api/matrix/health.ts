import type { FeatureExpectations } from './expectation'

export const health: FeatureExpectations = {
  readHealth: { own: () => ({}) },
  readOpenApi: { own: () => ({}) },
}
