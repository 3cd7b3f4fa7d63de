import type { Block, Sheet } from '../model'
import { label } from '../shapes'
import { connectionSheets } from './connection-sheets'
import { constructionSheets } from './construction-sheets'
import { newFlow, type Page } from './flow'
import { footBlocks, notStatedFoot, revisionFoot } from './foot'
import { SHEET, sheetFrame } from './frame'
import type { DrawingInput } from './input'
import { dataSheets, insulationSheets } from './insulation-sheets'
import { outlineSheet } from './outline-sheet'
import { TITLE_BLOCK, titleBlock } from './title-block'

export type { DrawingInput, SheetStatus } from './input'

/**
 * All sheets of one revision, A3 landscape: connections and electrical data; outline and pins; construction; core, former and trade data;
 * insulation, tests and notes. Long tables go on to further sheets. Never throws on a contradictory draft: what
 * contradicts is printed on it.
 */
export function drawSheets(input: DrawingInput): Sheet[] {
  const flow = newFlow()
  connectionSheets(flow, input)
  outlineSheet(flow, input)
  constructionSheets(flow, input)
  dataSheets(flow, input)
  const revisions = revisionFoot(input)
  const absent = notStatedFoot(input)
  insulationSheets(flow, input, { revisions: !revisions.whole, notStated: absent === null })
  return flow.pages.map((page, index) => finish(input, page, index + 1, flow.pages.length, { first: revisions.blocks, last: absent ?? [] }))
}

function finish(input: DrawingInput, page: Page, number: number, count: number, foot: { first: readonly Block[]; last: readonly Block[] }): Sheet {
  const block = titleBlock(input, { number, count, content: page.content, scale: page.scale })
  return {
    number,
    count,
    title: page.content,
    widthMm: SHEET.widthMm,
    heightMm: SHEET.heightMm,
    blocks: [
      ...(input.release ? [] : [draftMark(input)]),
      { kind: 'artifact', shapes: sheetFrame() },
      ...page.blocks,
      ...footBlocks(input),
      ...(number === 1 ? foot.first : number === count ? foot.last : []),
      { kind: 'text', box: TITLE_BLOCK, shapes: block },
    ],
  }
}

/** Below everything else, so that no drawing of a draft can be taken for a released one. */
function draftMark({ revision }: DrawingInput): Block {
  const mark = label([SHEET.widthMm / 2, SHEET.heightMm / 2 + 5], `DRAFT ${revision}`, { align: 'middle', heightMm: 38, font: 'sans-bold', ink: 'faint', rotationDeg: 30 })
  return { kind: 'artifact', shapes: [mark] }
}
