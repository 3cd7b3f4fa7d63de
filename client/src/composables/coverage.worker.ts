import { testCoverage, type TestCoverage } from '#shared/engine/index'
import type { Library } from '#shared/engine/library'
import type { SpecificationDocument } from '#shared/engine/specification'

export interface CoverageRequest {
  document: SpecificationDocument
  library: Library
}
export type CoverageAnswer = { coverage: TestCoverage } | { failure: string }

addEventListener('message', ({ data }: MessageEvent<CoverageRequest>) => {
  let answer: CoverageAnswer
  try {
    answer = { coverage: testCoverage(data.document, data.library) }
  } catch (error) {
    answer = { failure: error instanceof Error ? error.message : String(error) }
  }
  postMessage(answer)
})
