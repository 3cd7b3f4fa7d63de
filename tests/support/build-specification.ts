import { COUPLED_INDUCTOR } from '#server/db/seed/specifications/requirements'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { openChecks } from '#server/services/specifications/seal-release'
import * as contract from '#shared/contracts/specifications'
import { placeOfCheck } from '#shared/contracts/specifications'
import type { Revision } from '#shared/contracts/specifications'
import { evaluate, propose } from '#shared/engine/index'
import type { SpecificationDocument } from '#shared/engine/specification'
import { randomUUID } from 'node:crypto'
import type { TestPerson } from './factories'
import { request, type TestApp } from './test-app'

let proposed: SpecificationDocument | null = null

/** The proposal for a 1:1 coupled inductor, named. Only the shipped rows without a source (check L01) and the footprint (P21), which a person compares, stop its release. */
export function releasableDocument(partNumber: string, title = 'Inductor, coupled 1:1'): SpecificationDocument {
  proposed ??= propose(COUPLED_INDUCTOR, shippedLibrary()).document
  const document = structuredClone(proposed)
  const block = document.specification.title
  document.specification.former.leadSlotWidthMm = { value: 3.5, status: 'mandatory', origin: { kind: 'entered' } }
  for (const [field, value] of [['legalOwner', 'Owner'], ['partNumber', partNumber], ['title', title]] as const) {
    block[field] = { value, status: 'mandatory', origin: { kind: 'entered' } }
  }
  return document
}

export const newPartNumber = () => `T-${randomUUID().slice(0, 8)}`

/** A first draft, made through the interface. */
export async function buildDraft(test: TestApp, engineer: TestPerson, title?: string): Promise<Revision> {
  const partNumber = newPartNumber()
  const body = { partNumber, title: title ?? 'Inductor, coupled 1:1', document: releasableDocument(partNumber, title) }
  return (await request(test.app, contract.createSpecification, { as: engineer.cookie, body }).expect(200)).body
}

export const revisionParams = ({ specificationId, id }: Pick<Revision, 'specificationId' | 'id'>) => ({ specificationId, revisionId: id })

export async function buildInCheck(test: TestApp, engineer: TestPerson, title?: string): Promise<Revision> {
  const draft = await buildDraft(test, engineer, title)
  return (await request(test.app, contract.submitDraft, { as: engineer.cookie, params: revisionParams(draft), body: { version: draft.version } }).expect(200)).body
}

/** Ready for release: a second person has answered for the library rows that name no source, and for the footprint. */
export async function buildChecked(test: TestApp, engineer: TestPerson, second: TestPerson, title?: string): Promise<Revision> {
  return letRowsPass(test, await buildInCheck(test, engineer, title), second)
}

/** Answers for everything that stops the release, place by place; `answered` places are left out. */
export async function letRowsPass(test: TestApp, inCheck: Revision, second: TestPerson, answered: readonly string[] = []): Promise<Revision> {
  const open = openChecks(evaluate(inCheck.document, shippedLibrary()), new Set()).filter(({ path }) => !answered.includes(path))
  let revision = inCheck
  for (const { code, path } of new Map(open.map((check) => [placeOfCheck(check), check])).values()) {
    const body = { code, path, reason: 'Compared with parts on the bench.' }
    revision = (await request(test.app, contract.overrideCheck, { as: second.cookie, params: revisionParams(inCheck), body }).expect(200)).body
  }
  return revision
}
