import { AppError } from '#server/errors'
import type { RefusedFile } from '#shared/measurement/model'

/** What is wrong with a file of readings, where, and what to do. */
export function unreadableReport({ code, values }: RefusedFile): AppError {
  const message = sentence(code, values)
  return new AppError('file-unreadable', `${message} Nothing was stored.`, { file: message })
}

function sentence(code: RefusedFile['code'], values: RefusedFile['values']): string {
  switch (code) {
    case 'empty-file':
      return 'The file holds no text.'
    case 'not-a-text-table':
      return 'The file is not a table of plain text; save it as CSV.'
    case 'broken-quotes':
      return `The quotation marks that open in line ${values.line} are not closed, or something follows them; correct the line.`
    case 'no-table':
      return `No heading names a test of the drawing. Name the columns ${values.symbols}, or use the template.`
    case 'no-parts':
      return `Below the headings at ${values.heading} stands no reading.`
    case 'too-many-cells':
      return `The table has ${values.cells} cells; at most ${values.most} are read.`
  }
}
