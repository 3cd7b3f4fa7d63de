import type { Block, Sheet } from '../model'
import { box, label, labelLines, LETTERING, linesHeightMm } from '../shapes'
import { wrapText } from '../text-metrics'
import { connectionSheets } from './connection-sheets'
import { constructionSheets } from './construction-sheets'
import { newFlow, type Page } from './flow'
import { SHEET, sheetFrame, SPACE } from './frame'
import type { DrawingInput } from './input'
import { dataSheets, insulationSheets } from './insulation-sheets'
import { TITLE_BLOCK, titleBlock } from './title-block'
import { CONTRACT_WORDS } from './words'

export type { DrawingInput, SheetStatus } from './input'

/**
 * All sheets of one revision, A3 landscape: connections and electrical data; construction; core, former and trade data;
 * insulation, tests and notes. Long tables go on to further sheets. Never throws on a contradictory draft: what
 * contradicts is printed on it.
 */
export function drawSheets(input: DrawingInput): Sheet[] {
  const flow = newFlow()
  connectionSheets(flow, input)
  constructionSheets(flow, input)
  dataSheets(flow, input)
  insulationSheets(flow, input)
  return flow.pages.map((page, index) => finish(input, page, index + 1, flow.pages.length))
}

function finish(input: DrawingInput, page: Page, number: number, count: number): Sheet {
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
      footBlock(input),
      { kind: 'text', box: TITLE_BLOCK, shapes: block },
    ],
  }
}

/** Below everything else, so that no drawing of a draft can be taken for a released one. */
function draftMark({ revision }: DrawingInput): Block {
  const mark = label([SHEET.widthMm / 2, SHEET.heightMm / 2 + 5], `DRAFT ${revision}`, { align: 'middle', heightMm: 38, font: 'sans-bold', ink: 'faint', rotationDeg: 30 })
  return { kind: 'artifact', shapes: [mark] }
}

/** Beside the title block, on every sheet. */
function footBlock({ specification }: DrawingInput): Block {
  const lines = [
    'M mandatory: the vendor answers for it. R for reference: not inspected. V vendor’s choice: to be declared, frozen at approval.',
    CONTRACT_WORDS[specification.contract],
    'Figures in parentheses are predicted, not specified. The specification is attached to this file as JSON; its SHA-256 stands in the title block.',
  ]
  const widthMm = TITLE_BLOCK.leftMm - SPACE.leftMm - 4
  const wrapped = lines.flatMap((text) => wrapText(text, 'sans', LETTERING.small, widthMm))
  const height = linesHeightMm(wrapped.length, LETTERING.small)
  const bottom = TITLE_BLOCK.bottomMm + 4
  const shapes = labelLines(SPACE.leftMm, bottom + height, wrapped, { heightMm: LETTERING.small })
  return { kind: 'text', box: box(SPACE.leftMm, bottom, widthMm, height), shapes }
}
