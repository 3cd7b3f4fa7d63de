import type { SpecificationDocument, Stated } from '#shared/engine/specification'

const emptied = <T>(field: Stated<T>): Stated<T> => ({ ...field, value: null, origin: { kind: 'entered' } })

/** A proven part as the beginning of another: everything of it but its own drawing number, its revision block and how far it got. */
export function copiedDocument(document: SpecificationDocument): SpecificationDocument {
  const { specification } = document
  const { title } = specification
  return {
    ...document,
    specification: {
      ...specification,
      title: { ...title, drawingNumber: emptied(title.drawingNumber), documentStatus: { ...title.documentStatus, value: 'for-quotation-only', origin: { kind: 'default', source: 'beginning of a part' } } },
      revisions: [],
    },
  }
}
