import type { FeatureExpectations } from './expectation'

export const audit: FeatureExpectations = {
  listAudit: { own: () => ({}) },
}
