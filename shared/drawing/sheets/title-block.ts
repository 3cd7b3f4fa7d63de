import type { BoxMm, FontRole, Shape } from '../model'
import { box, fitText, labelLines, LETTERING, label, line, linesHeightMm, rectangle } from '../shapes'
import type { DrawingInput } from './input'
import { projectionSymbol } from './projection-symbol'
import { STATUS_WORDS } from './words'

/** ISO 7200: 180 mm wide, in the lower right corner of the drawing space. */
export const TITLE_BLOCK = box(230, 10, 180, 53)

export interface SheetPlace {
  number: number
  count: number
  /** What this sheet shows. */
  content: string
  /** Scale of the figures to scale, e.g. `10:1`; empty where there is none. */
  scale: string
}

interface Field {
  caption: string
  text: string
  widthMm: number
  font?: FontRole
  heights?: readonly number[]
}

interface Band {
  heightMm: number
  fields: readonly Field[]
}

/** Below the smallest nominal size only where a text would not fit otherwise. */
const VALUE_HEIGHTS = [LETTERING.body, LETTERING.small, 1.4, 1.1, 0.8]
const CAPTION_HEIGHT_MM = 1.8
const NOT_STATED = 'not stated'

/** Title block with the data fields of ISO 7200; bands from the lower edge upwards. */
export function titleBlock(input: DrawingInput, place: SheetPlace): Shape[] {
  const shapes: Shape[] = [rectangle(TITLE_BLOCK, { layer: 'outline', fill: 'paper' })]
  let bottom = TITLE_BLOCK.bottomMm
  for (const band of bands(input, place)) {
    shapes.push(...bandShapes(band, bottom))
    bottom += band.heightMm
  }
  shapes.push(...projection(input))
  return shapes
}

function bands(input: DrawingInput, place: SheetPlace): Band[] {
  const { title, tolerances } = input.specification
  const { release } = input
  const text = (value: string | null) => value ?? NOT_STATED
  const person = (name: string | undefined) => name ?? (release ? NOT_STATED : 'not released')
  return [
    {
      heightMm: 8,
      fields: [
        { caption: 'Responsible dept.', text: text(title.responsibleDepartment.value), widthMm: 28 },
        { caption: 'Technical reference', text: text(title.technicalReference.value), widthMm: 28 },
        { caption: 'Created by', text: person(release?.createdBy), widthMm: 32 },
        { caption: 'Checked by', text: person(release?.checkedBy), widthMm: 32 },
        { caption: 'Approved by', text: person(release?.approvedBy), widthMm: 32 },
        { caption: 'Language', text: text(title.languageCode.value), widthMm: 15 },
        { caption: 'Sheet', text: `${place.number}/${place.count}`, widthMm: 13 },
      ],
    },
    {
      heightMm: 8,
      fields: [
        { caption: 'Legal owner', text: text(title.legalOwner.value), widthMm: 48, font: 'sans-bold' },
        { caption: 'Document type', text: text(title.documentType.value), widthMm: 60 },
        { caption: 'Document status', text: STATUS_WORDS[input.status], widthMm: 44, font: 'sans-bold' },
        { caption: 'Classification', text: text(title.classification.value), widthMm: 28 },
      ],
    },
    {
      heightMm: 14.5,
      fields: [
        { caption: 'Title, supplementary title', text: titleText(input), widthMm: 87, heights: [LETTERING.heading, ...VALUE_HEIGHTS] },
        { caption: 'Identification number', text: identification(input), widthMm: 52, font: 'mono', heights: [LETTERING.number, LETTERING.heading, ...VALUE_HEIGHTS] },
        { caption: 'Revision', text: input.revision, widthMm: 16, font: 'sans-bold', heights: [LETTERING.number, LETTERING.heading, ...VALUE_HEIGHTS] },
        { caption: 'Date of issue', text: release?.issuedOn.slice(0, 10) ?? 'not released', widthMm: 25 },
      ],
    },
    {
      heightMm: 9,
      fields: [
        { caption: 'Sheet content', text: place.content, widthMm: 64 },
        { caption: 'Scale', text: place.scale === '' ? 'not to scale' : place.scale, widthMm: 22 },
        { caption: 'General tolerance', text: text(tolerances.general.value), widthMm: 40 },
        { caption: 'Projection', text: '', widthMm: 22 },
        { caption: 'Units', text: 'mm', widthMm: 12 },
        { caption: 'Sheet size', text: title.paperSize.value ?? 'A3', widthMm: 20 },
      ],
    },
    {
      heightMm: 6.5,
      fields: [
        { caption: 'SHA-256 of the specification', text: input.specificationHash ?? 'given at release', widthMm: 125, font: 'mono', heights: [LETTERING.small, 1.4] },
        { caption: '', text: 'Do not scale the drawing', widthMm: 55, font: 'sans-bold', heights: [LETTERING.body] },
      ],
    },
    { heightMm: 7, fields: [{ caption: 'Confidentiality', text: text(title.confidentiality.value), widthMm: 180 }] },
  ]
}

function titleText({ specification }: DrawingInput): string {
  const { title, supplementaryTitle } = specification.title
  const main = title.value ?? NOT_STATED
  return supplementaryTitle.value === null ? main : `${main}\n${supplementaryTitle.value}`
}

function identification({ specification }: DrawingInput): string {
  const { partNumber, drawingNumber } = specification.title
  const part = partNumber.value ?? NOT_STATED
  const drawing = drawingNumber.value
  return drawing === null || drawing === part ? part : `${part}\nDrawing ${drawing}`
}

function bandShapes(band: Band, bottomMm: number): Shape[] {
  let left = TITLE_BLOCK.leftMm
  const top = bottomMm + band.heightMm
  const shapes: Shape[] = [line([TITLE_BLOCK.leftMm, top], [TITLE_BLOCK.rightMm, top], 'thin')]
  for (const field of band.fields) {
    shapes.push(...fieldShapes(field, box(left, bottomMm, field.widthMm, band.heightMm)))
    left += field.widthMm
    if (left < TITLE_BLOCK.rightMm - 0.1) shapes.push(line([left, bottomMm], [left, top], 'thin'))
  }
  return shapes
}

function fieldShapes(field: Field, area: BoxMm): Shape[] {
  const font = field.font ?? 'sans'
  const captionMm = field.caption === '' ? 0 : CAPTION_HEIGHT_MM + 0.9
  const room = { width: field.widthMm - 2, height: area.topMm - area.bottomMm - captionMm - 1 }
  const { heightMm, lines } = fitText(field.text, font, room.width, room.height, field.heights ?? VALUE_HEIGHTS)
  const slack = Math.max(0, room.height - linesHeightMm(lines.length, heightMm))
  const top = area.topMm - captionMm - 0.5 - slack / 2
  return [
    ...(field.caption === '' ? [] : [label([area.leftMm + 1, area.topMm - 0.7 - CAPTION_HEIGHT_MM], field.caption, { heightMm: CAPTION_HEIGHT_MM })]),
    ...labelLines(area.leftMm + 1, top, lines, { heightMm, font }),
  ]
}

function projection({ specification }: DrawingInput): Shape[] {
  const method = specification.title.projection.value
  const field = { left: TITLE_BLOCK.leftMm + 126, bottom: TITLE_BLOCK.bottomMm + 30.5 }
  if (method === null) return [label([field.left + 1, field.bottom + 2.2], NOT_STATED, { heightMm: LETTERING.small })]
  return projectionSymbol([field.left + 11, field.bottom + 3.25], method)
}
