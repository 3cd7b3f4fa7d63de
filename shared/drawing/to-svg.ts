import { blockShapes, type Block, type Picture, type Shape, type Sheet } from './model'
import { formatMm } from './path-data'
import { svgElements, type SvgElement } from './svg-element'

const ENTITIES: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' }

const escape = (text: string) => text.replace(/[&<>"']/g, (character) => ENTITIES[character]!)

const attributes = (values: Readonly<Record<string, string>>) =>
  Object.entries(values)
    .map(([name, value]) => ` ${name}="${escape(value)}"`)
    .join('')

const markup = ({ name, attributes: values, text }: SvgElement) =>
  text === '' ? `<${name}${attributes(values)}/>` : `<${name}${attributes(values)}>${escape(text)}</${name}>`

const shapesMarkup = (shapes: readonly Shape[], heightMm: number) =>
  shapes.flatMap((shape) => svgElements(shape, heightMm)).map(markup).join('\n')

/** Letters stand as the width table has them, so kerning and ligatures are off. */
export const SVG_TEXT_STYLE = 'font-kerning:none;font-variant-ligatures:none;text-rendering:geometricPrecision'

function open(picture: Pick<Picture, 'widthMm' | 'heightMm'>, title: string): string {
  const size = `${formatMm(picture.widthMm)} ${formatMm(picture.heightMm)}`
  const dimensions = `width="${formatMm(picture.widthMm)}mm" height="${formatMm(picture.heightMm)}mm"`
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${size}" ${dimensions} role="img" style="${SVG_TEXT_STYLE}" aria-label="${escape(title)}">`
}

/** A picture as SVG text. All text is escaped. */
export const toSvg = (picture: Picture, title: string): string =>
  `${open(picture, title)}\n${shapesMarkup(picture.shapes, picture.heightMm)}\n</svg>\n`

function blockMarkup(block: Block, heightMm: number): string {
  const body = shapesMarkup(blockShapes(block), heightMm)
  if (block.kind === 'artifact') return `<g aria-hidden="true">\n${body}\n</g>`
  if (block.kind === 'figure') return `<g role="img" aria-label="${escape(`${block.title}: ${block.alternative}`)}">\n${body}\n</g>`
  return `<g>\n${body}\n</g>`
}

/** A sheet as SVG text on white paper, one group per block in reading order. All text is escaped. */
export function sheetToSvg(sheet: Sheet): string {
  const title = `${sheet.title}, sheet ${sheet.number} of ${sheet.count}`
  const paper = `<rect width="${formatMm(sheet.widthMm)}" height="${formatMm(sheet.heightMm)}" fill="#ffffff"/>`
  const groups = sheet.blocks.map((block) => blockMarkup(block, sheet.heightMm))
  // Text of a sheet shall stay readable to a screen reader, which an image is not.
  return `${open(sheet, title).replace('role="img"', 'role="group"')}\n${paper}\n${groups.join('\n')}\n</svg>\n`
}
