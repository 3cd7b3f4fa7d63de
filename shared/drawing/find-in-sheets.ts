import { blockShapes, type Block, type BoxMm, type Shape, type Sheet, type TableBlock } from './model'
import { labelBox } from './text-metrics'

/** One place on one sheet that answers a search. */
export interface SheetHit {
  /** Index of the sheet. */
  sheet: number
  /** What was found there, in words. */
  text: string
  box: BoxMm
}

/**
 * Places on the sheets that answer a search: `pin 9` or `step 5` name a terminal or a row of the winding sequence and
 * find everything drawn of it; a bare name finds both, and after them each text that holds it. Empty finds nothing.
 */
export function findInSheets(sheets: readonly Sheet[], query: string): SheetHit[] {
  const wanted = query.trim().toLowerCase()
  if (wanted === '') return []
  const named = /^(pin|terminal|step|row)\s+(\S.*)$/.exec(wanted)
  const tags = named ? tagsNamed(sheets, named[1]!, named[2]!) : [...tagsNamed(sheets, 'pin', wanted), ...tagsNamed(sheets, 'step', wanted)]
  const tagged = sheets.flatMap((sheet, index) => tags.flatMap((tag) => sheet.blocks.flatMap((block) => taggedHits(block, tag, index))))
  return named && tags.length > 0 ? tagged : [...tagged, ...textHits(sheets, wanted, tags)]
}

/** Tags that a name stands for; a step by the number of its row. */
function tagsNamed(sheets: readonly Sheet[], kind: string, name: string): string[] {
  const all = [...new Set(sheets.flatMap(({ blocks }) => blocks.flatMap(blockShapes)).flatMap(({ tag }) => tag?.split(' ') ?? []))]
  if (kind === 'pin' || kind === 'terminal') return all.filter((tag) => tag.toLowerCase() === `pin:${name}`)
  const rows = sheets.flatMap(({ blocks }) => blocks.flatMap((block) => (block.kind === 'table' ? block.rows : [])))
  const row = rows.find(({ tag, cells }) => tag?.startsWith('step:') && cells[0]?.labels[0]?.text === name)
  return row?.tag === undefined ? [] : [row.tag]
}

function taggedHits(block: Block, tag: string, sheet: number): SheetHit[] {
  if (block.kind === 'artifact') return []
  if (block.kind === 'table') return block.rows.flatMap((row) => (row.tag === tag ? [{ sheet, text: `${nameOf(tag)} – ${block.title}`, box: rowBox(block, row.cells.flatMap(({ labels }) => labels)) }] : []))
  const found = block.shapes.filter((shape) => shape.tag?.split(' ').includes(tag))
  if (found.length === 0) return []
  const where = block.kind === 'figure' ? block.title : block.kind
  return clusters(found.map(shapeBox)).map((box) => ({ sheet, text: `${nameOf(tag)} – ${where}`, box }))
}

const nameOf = (tag: string) => (tag.startsWith('pin:') ? `pin ${tag.slice(4)}` : 'winding step')

function rowBox(table: TableBlock, labels: readonly Shape[]): BoxMm {
  const box = union(labels.map(shapeBox))
  return { ...box, leftMm: table.box.leftMm, rightMm: table.box.rightMm }
}

function textHits(sheets: readonly Sheet[], wanted: string, tags: readonly string[]): SheetHit[] {
  return sheets.flatMap((sheet, index) =>
    sheet.blocks
      .filter(({ kind }) => kind !== 'artifact')
      .flatMap(blockShapes)
      .flatMap((shape) => {
        if (shape.kind !== 'label' || !plain(shape.text).includes(wanted)) return []
        return shape.tag?.split(' ').some((tag) => tags.includes(tag)) ? [] : [{ sheet: index, text: shape.text, box: labelBox(shape) }]
      }),
  )
}

const plain = (text: string) => text.toLowerCase().replace(/[\u00a0\u202f]/g, ' ')

function shapeBox(shape: Shape): BoxMm {
  switch (shape.kind) {
    case 'label':
      return labelBox(shape)
    case 'circle': {
      const [[x, y], r] = [shape.center, shape.radiusMm]
      return { leftMm: x - r, rightMm: x + r, bottomMm: y - r, topMm: y + r }
    }
    case 'modules': {
      const [[x, y], size] = [shape.corner, shape.rows.length * shape.moduleMm]
      return { leftMm: x, rightMm: x + size, bottomMm: y, topMm: y + size }
    }
    case 'path': {
      const points = [shape.from, ...shape.steps.map(({ to }) => to)]
      const [xs, ys] = [points.map(([x]) => x), points.map(([, y]) => y)]
      return { leftMm: Math.min(...xs), rightMm: Math.max(...xs), bottomMm: Math.min(...ys), topMm: Math.max(...ys) }
    }
  }
}

const union = (boxes: readonly BoxMm[]): BoxMm => ({
  leftMm: Math.min(...boxes.map(({ leftMm }) => leftMm)),
  rightMm: Math.max(...boxes.map(({ rightMm }) => rightMm)),
  bottomMm: Math.min(...boxes.map(({ bottomMm }) => bottomMm)),
  topMm: Math.max(...boxes.map(({ topMm }) => topMm)),
})

/** Shapes of one thing lie closer together than this. */
const REACH_MM = 25

/** Boxes that lie near each other as one: what is drawn twice in a figure is found twice. */
function clusters(boxes: readonly BoxMm[]): BoxMm[] {
  const found: BoxMm[] = []
  for (const box of boxes) {
    const near = found.findIndex((other) => gap(box, other) < REACH_MM)
    if (near < 0) found.push(box)
    else found[near] = union([found[near]!, box])
  }
  return found
}

const gap = (a: BoxMm, b: BoxMm) => Math.hypot(Math.max(0, a.leftMm - b.rightMm, b.leftMm - a.rightMm), Math.max(0, a.bottomMm - b.topMm, b.bottomMm - a.topMm))
