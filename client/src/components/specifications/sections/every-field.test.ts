import { mount } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import { computed, defineComponent, h, ref, shallowRef } from 'vue'
import { z } from 'zod'
import { windingSpecificationSchema } from '#shared/contracts/specification-document'
import type { SpecificationDocument } from '#shared/engine/specification'
import { isTree } from '#shared/workflow/document-rows'
import { provideDocumentEntry } from '@/composables/useDocumentEntry'
import { fullSpecification } from '../../../../../tests/support/full-specification'
import { sampleLibrary } from '../../../../../tests/support/sample-specification'
import { documentPath, valueAt, withValue } from '../document-paths'
import SectionForm from '../SectionForm.vue'
import { SECTIONS } from '.'

// --- every place of the published schema ---------------------------------------------------------------

interface Node {
  type?: string
  const?: unknown
  properties?: Record<string, Node>
  items?: Node
  prefixItems?: Node[]
  anyOf?: Node[]
  oneOf?: Node[]
}

/** Given by the program: what a row is known by, and what kind of step it is. */
const GIVEN = new Set(['id', 'status', 'origin', 'kind'])
const alternatives = (node: Node): Node[] => (node.anyOf ?? node.oneOf ?? [node]).flatMap((one) => (one === node ? [node] : alternatives(one))).filter(({ type }) => type !== 'null')
const has = (node: Node, ...keys: string[]) => keys.every((key) => node.properties && key in node.properties)
const isReference = (node: Node) => has(node, 'id', 'version')
const join = (path: string, key: string) => (path === '' ? key : `${path}.${key}`)

/** Places that hold a value; `[]` stands for any row, and a step says its kind. */
function placesOf(node: Node, path = ''): string[] {
  return alternatives(node).flatMap((one) => {
    if (has(one, 'value', 'status', 'origin')) return placesOf(one.properties!.value!, join(path, 'value'))
    if (one.items) return alternatives(one.items).some(({ properties }) => properties) ? alternatives(one.items).flatMap((row) => rowPlaces(row, path)) : [path]
    if (one.properties && !isReference(one)) return Object.entries(one.properties).filter(([key]) => key !== 'schema').flatMap(([key, inner]) => placesOf(inner, join(path, key)))
    return [path]
  })
}

function rowPlaces(row: Node, path: string): string[] {
  const kind = row.properties?.kind?.const
  const base = `${path}.[${typeof kind === 'string' ? kind : ''}]`
  return Object.entries(row.properties ?? {}).flatMap(([key, inner]) => (GIVEN.has(key) && !(key === 'kind' && kind === undefined) ? [] : placesOf(inner, join(base, key))))
}

const wanted = [...new Set(placesOf(z.toJSONSchema(windingSpecificationSchema, { io: 'input' }) as Node))]

// --- every place with an entry in the mounted form -------------------------------------------------------

const CONTROL = 'input, select, textarea, button'

/** One row of each kind of step, so that each can be looked at. */
function allKinds(): SpecificationDocument {
  const document = fullSpecification()
  const entered = { status: 'mandatory', origin: { kind: 'entered' }, remark: '' } as const
  const sleeve = document.specification.sequence.flatMap((step) => (step.kind === 'winding' ? (step.startSleeve?.sleeve ?? []) : []))[0] ?? { kind: 'sleeve' as const, id: sampleLibrary.sleeves[0]!.id, version: 1 }
  const tape = { kind: 'tape' as const, id: sampleLibrary.tapes[0]!.id, version: 1 }
  document.specification.sequence.push(
    { ...entered, id: 'k1', kind: 'shield', windingId: 'w1', form: 'foil', thicknessMm: 0.05, widthMm: 10, overlapMm: 3, overlapInsulation: 'tape', connectedTerminal: '1' },
    { ...entered, id: 'k2', kind: 'sleeve', sleeve, lead: 'S1 start', lengthMm: 15 },
    { ...entered, id: 'k3', kind: 'core-tape', tape, layers: 2, purpose: 'banding' },
    { ...entered, id: 'k4', kind: 'varnish', extent: 'coil-only' },
    { ...entered, id: 'k5', kind: 'margin', tape, leftMm: 3, rightMm: 3, heightMm: null },
    { ...entered, id: 'k6', kind: 'tape', tape, layers: 1, widthMm: null, purpose: 'outer' },
  )
  document.specification.windings[0]!.wire.certificate ??= { standard: 'IEC 62368-1', number: '1', peakVoltageV: null, maximumFrequencyHz: null }
  document.specification.windings[0]!.wire.lay ??= { lengthMm: 20, direction: 'S' }
  return document
}

function show(sectionKey: string) {
  const document = shallowRef(allKinds())
  const Form = defineComponent({
    setup() {
      const none = new Map<string, never>()
      provideDocumentEntry({
        read: (path) => valueAt(document.value, documentPath(path)),
        write: (changes) => Object.entries(changes).forEach(([path, value]) => (document.value = withValue(document.value, documentPath(path), value))),
        document, library: shallowRef(sampleLibrary), readonly: ref(false), problems: computed(() => none), flags: computed(() => none), target: ref(null), marked: ref(null),
      })
      return () => h(SectionForm, { section: SECTIONS.find(({ key }) => key === sectionKey)! })
    },
  })
  return { form: mount(Form), document }
}

/** A place as the schema names it: rows without their number, steps with their kind. */
function schemaPlace(place: string, document: SpecificationDocument): string {
  const parts = place.split('.')
  return parts
    .map((part, index) => {
      if (!/^\d+$/.test(part) || parts[index - 1] === 'between') return part
      const row = valueAt(document.specification, parts.slice(0, index + 1).join('.'))
      return `[${isTree(row) && parts[0] === 'sequence' ? String(row.kind) : ''}]`
    })
    .join('.')
}

async function entriesOf(sectionKey: string): Promise<string[]> {
  const { form, document } = show(sectionKey)
  const found = new Set<string>()
  const look = () => form.findAll('[data-place]').forEach((element) => element.find(CONTROL).exists() && found.add(schemaPlace(element.attributes('data-place')!, document.value)))
  for (const part of form.findAll('.fold-button[aria-expanded="false"]')) await part.trigger('click')
  look()
  for (const row of form.findAll('.open-button')) {
    await row.trigger('click')
    look()
  }
  form.unmount()
  return [...found]
}

describe('every field of the published schema', () => {
  it('has its place in the form', async () => {
    const entries = (await Promise.all(SECTIONS.filter(({ key }) => key !== 'requirement').map(({ key }) => entriesOf(key)))).flat()
    // A list, a pair of limits or a reference is entered as a whole.
    const entered = (place: string) => entries.some((entry) => [entry, `${entry}.value`].some((whole) => place === whole || (WHOLE.test(place) && place.startsWith(`${whole}.`))))
    expect(wanted.filter((place) => !entered(place))).toEqual([])
  }, 60_000)

  it('is a few hundred places, none of them forgotten by the walk', () => {
    expect(wanted.length).toBeGreaterThan(230)
    for (const place of ['core.gap.alH.value', 'sequence.[winding].startSleeve.intoWindingMm', 'tests.[].shortedTerminals', 'insulation.boundaries.[].test.tripA', 'former.pins.[].xMm', 'sequence.[shield].overlapMm']) expect(wanted).toContain(place)
  })
})

/** Entered as lines of text, or chosen as one end. */
const WHOLE = /^(electrical\.commonMode\.value\.impedance|revisions\.\[\]\.changes|insulation\.boundaries\.\[\]\.between)\b/
