import type { Context } from '#server/context'
import { AppError } from '#server/errors'
import { renderSpecificationPdf } from '#server/pdf/render-sheets'
import { keepMadeFile, type StoredFile } from '#server/services/files/store-file'
import { canonicalJson } from '#shared/canonical-json'
import { placeOfCheck } from '#shared/contracts/specifications'
import { drawSheets } from '#shared/drawing/sheets/index'
import { unprintable } from '#shared/drawing/text-metrics'
import type { CheckResult, Evaluation } from '#shared/engine/evaluation'
import { evaluate } from '#shared/engine/index'
import { libraryInUse, RELEASED_SCHEMA, type ReleasedSpecification } from '#shared/engine/released'
import type { Library } from '#shared/engine/library'
import type { ReleaseRecord, SpecificationDocument } from '#shared/engine/specification'
import { createHash } from 'node:crypto'
import { pdfAttachment, pdfInfo, sheetsFileName } from './pdf-parts'

export interface ReleaseInput {
  document: SpecificationDocument
  library: Library
  release: ReleaseRecord
  /** Checks that a second person let pass, each at its place. */
  overridden: ReadonlySet<string>
}

export interface SealedRelease {
  engine: string
  /** Canonical JSON of the released specification, and its SHA-256. */
  specification: Buffer
  specificationSha256: string
  evaluation: Buffer
  sheets: Buffer
  /** The archived PDF, kept under its hash. */
  file: Omit<StoredFile, 'id'>
}

/** Evaluates, checks, draws and keeps one release. No transaction is open meanwhile. */
export async function sealRelease(ctx: Context, input: ReleaseInput): Promise<SealedRelease> {
  const { document, release } = input
  const { library, missing } = libraryInUse(document.specification, input.library)
  if (missing.length > 0) throw missingRows(missing.map(({ kind, id, version }) => `${kind} ${id}, version ${version}`))

  const evaluation = evaluate(document, library)
  refuseOpenChecks(evaluation, input.overridden)
  refuseUnprintable(document)

  const released: ReleasedSpecification = { schema: RELEASED_SCHEMA, release, engine: evaluation.engine, specification: document.specification, library }
  const bytes = Buffer.from(canonicalJson(released), 'utf8')
  const specificationSha256 = createHash('sha256').update(bytes).digest('hex')

  const sheets = drawSheets({
    specification: document.specification,
    evaluation,
    library,
    revision: release.revision,
    release,
    specificationHash: specificationSha256,
    status: document.specification.title.documentStatus.value ?? 'released',
  })
  const { title } = document.specification
  const partNumber = title.partNumber.value ?? ''
  const pdf = await renderSpecificationPdf({
    sheets,
    info: pdfInfo({ partNumber, revision: release.revision, title: title.title.value ?? '', company: title.legalOwner.value ?? '', issuedOn: release.issuedOn }),
    attachment: pdfAttachment(bytes),
  })
  return {
    engine: evaluation.engine,
    specification: bytes,
    specificationSha256,
    evaluation: Buffer.from(canonicalJson(evaluation), 'utf8'),
    sheets: Buffer.from(JSON.stringify(sheets), 'utf8'),
    file: await keepMadeFile(ctx, pdf, sheetsFileName(partNumber, release.revision), 'pdf'),
  }
}

function missingRows(rows: string[]): AppError {
  return new AppError('release-stopped', `The parts library does not hold what the document uses: ${rows.join('; ')}. Choose other parts.`)
}

/**
 * What is not met stops release, and so does what could not be checked: it never counts as met. A check that was let
 * pass at one place stops release at every other.
 */
export function openChecks(evaluation: Evaluation, overridden: ReadonlySet<string>): CheckResult[] {
  return evaluation.checks.filter((check) => check.severity === 'S' && check.state !== 'met' && !overridden.has(placeOfCheck(check)))
}

function refuseOpenChecks(evaluation: Evaluation, overridden: ReadonlySet<string>): void {
  const open = openChecks(evaluation, overridden)
  if (open.length === 0) return
  const fields = Object.fromEntries(open.map((check) => [check.code, check.state === 'not-met' ? 'Not met.' : 'Could not be checked for want of an input.']))
  const codes = [...new Set(open.map((check) => check.code))]
  throw new AppError('release-stopped', `Release is stopped by ${codes.join(', ')}. Mend the document, or let a check pass with a reason.`, fields)
}

/** A character that no shipped font has would print as nothing. */
function refuseUnprintable(document: SpecificationDocument): void {
  const found = unprintable(document.specification)
  if (found.length === 0) return
  const fields = Object.fromEntries(found.map(({ path, glyphs }) => [path, `Cannot be printed: ${glyphs.join(' ')}`]))
  throw new AppError('unprintable-text', `The sheets cannot print ${[...new Set(found.flatMap(({ glyphs }) => glyphs))].join(' ')}; use other characters.`, fields)
}
