import type { Block } from '../model'
import { matrixCodeShape } from '../matrix-code'
import { box, label, labelLines, LETTERING, linesHeightMm } from '../shapes'
import { drawTablePart, layoutTable, tableHeightMm, type TableContent } from '../table'
import { wrapText } from '../text-metrics'
import { SPACE } from './frame'
import type { DrawingInput } from './input'
import { notStated } from './notices'
import { revisionTable } from './record-tables'
import { TITLE_BLOCK } from './title-block'
import { CONTRACT_WORDS } from './words'

const CODE_MM = 31
const CODE_LEFT_MM = TITLE_BLOCK.leftMm - CODE_MM - 1
const TEXT_WIDTH_MM = CODE_LEFT_MM - SPACE.leftMm - 3
const BOTTOM_MM = TITLE_BLOCK.bottomMm + 2
const GAP_MM = 3
const HEADING_MM = 5

/** What the two-dimensional code of a sheet holds: part, revision and, once released, the hash of the specification. */
export function codeText({ specification, revision, specificationHash }: Pick<DrawingInput, 'specification' | 'revision' | 'specificationHash'>): string {
  const part = specification.title.partNumber.value ?? '?'
  return `PART ${part}\nREV ${revision}\n${specificationHash === null ? 'NOT RELEASED' : `SHA256 ${specificationHash}`}`
}

const words = ({ specification }: DrawingInput): string[] =>
  [
    'M mandatory: the vendor answers for it. R for reference: not inspected. V vendor’s choice: to be declared, frozen at approval.',
    CONTRACT_WORDS[specification.contract],
    'Figures in parentheses are for reference: predicted, or taken from the parts library; they are not specified.',
    'The specification is attached to this file as JSON; its SHA-256 stands in the title block. The code holds part number, revision and SHA-256.',
  ].flatMap((text) => wrapText(text, 'sans', LETTERING.small, TEXT_WIDTH_MM))

/** Beside the title block on every sheet: how the drawing is read, and the code that names it. */
export function footBlocks(input: DrawingInput): Block[] {
  const lines = words(input)
  const height = linesHeightMm(lines.length, LETTERING.small)
  const top = TITLE_BLOCK.bottomMm + CODE_MM
  const caption = labelLines(CODE_LEFT_MM + 3, top + LETTERING.small + 0.8, ['ISO/IEC 18004'], { heightMm: LETTERING.small })
  return [
    { kind: 'text', box: box(SPACE.leftMm, BOTTOM_MM, TEXT_WIDTH_MM, height), shapes: labelLines(SPACE.leftMm, BOTTOM_MM + height, lines, { heightMm: LETTERING.small }) },
    {
      kind: 'figure',
      title: 'Code of the drawing',
      alternative: codeText(input).replaceAll('\n', ', '),
      box: box(CODE_LEFT_MM, TITLE_BLOCK.bottomMm, CODE_MM, CODE_MM + 3),
      shapes: [matrixCodeShape(codeText(input), [CODE_LEFT_MM, TITLE_BLOCK.bottomMm], CODE_MM, 'code'), ...caption],
    },
  ]
}

/**
 * The revision block beside the title block of the first sheet: as many of the newest revisions as have room. `whole`
 * says that all have, so that no table of its own is needed.
 */
export function revisionFoot(input: DrawingInput): { blocks: Block[]; whole: boolean } {
  const content = revisionTable(input.specification)
  if (content.rows.length === 0) return { blocks: [], whole: true }
  const bottomMm = BOTTOM_MM + linesHeightMm(words(input).length, LETTERING.small) + GAP_MM
  const roomMm = TITLE_BLOCK.topMm - bottomMm
  for (let first = 0; first < content.rows.length; first++) {
    if (content.rows[first]!.cells.revision === undefined) continue
    const blocks = fits({ ...content, heightMm: LETTERING.small, rows: content.rows.slice(first), ...(first > 0 && { title: 'Newest revisions (all on the last sheet)' }) }, roomMm)
    if (blocks) return { blocks, whole: first === 0 }
  }
  return { blocks: [], whole: false }
}

/** What is not stated, beside the title block of the last sheet; null when it finds no room there. */
export function notStatedFoot(input: DrawingInput): Block[] | null {
  const groups = notStated(input)
  if (groups.length === 0) return []
  const lines = groups.flatMap((text) => wrapText(text, 'sans', LETTERING.small, TEXT_WIDTH_MM))
  const bottomMm = BOTTOM_MM + linesHeightMm(words(input).length, LETTERING.small) + GAP_MM
  const height = linesHeightMm(lines.length, LETTERING.small)
  const top = TITLE_BLOCK.topMm - HEADING_MM
  if (top - height < bottomMm) return null
  const title = 'Not stated'
  return [
    { kind: 'heading', level: 2, text: title, box: box(SPACE.leftMm, top, TEXT_WIDTH_MM, HEADING_MM), shapes: [label([SPACE.leftMm, top + 1.8], title, { font: 'sans-bold' })] },
    { kind: 'text', box: box(SPACE.leftMm, top - height, TEXT_WIDTH_MM, height), shapes: labelLines(SPACE.leftMm, top, lines, { heightMm: LETTERING.small }) },
  ]
}

function fits(content: TableContent, roomMm: number): Block[] | null {
  const layout = layoutTable(content, TEXT_WIDTH_MM)
  if (tableHeightMm(layout) > roomMm) return null
  const part = drawTablePart(layout, 0, SPACE.leftMm, TITLE_BLOCK.topMm, TITLE_BLOCK.topMm - roomMm)
  return part ? [part.block] : null
}
