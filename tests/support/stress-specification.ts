import type { SequenceStep, SpecificationDocument, Winding } from '#shared/engine/specification'
import { row, stated } from './blank-specification'
import { mainsFlyback } from './sample-specification'

const WINDINGS = 10
const STEPS = 60
const TESTS = 30

/** As much as a drawing has to hold: ten windings, sixty steps, thirty tests, long names, Greek and accented letters. */
export function stressPart(): SpecificationDocument {
  const document = mainsFlyback()
  const { specification } = document
  const pins = specification.former.pins.map((pin) => ({ ...pin, state: 'fitted' as const }))
  const base = specification.windings[1]!
  specification.windings = Array.from({ length: WINDINGS }, (_, index): Winding => ({
    ...base,
    id: `w${index + 1}`,
    name: index === 0 ? 'P1a' : `S${index}-Überwachung-Ω`,
    role: index === 0 ? 'primary' : 'secondary',
    side: index < 2 ? 'primary' : (['secondary', 'secondary-2', 'secondary-3'] as const)[index % 3]!,
    startTerminal: pins[index % pins.length]!.number,
    finishTerminal: pins[(index + 1) % pins.length]!.number,
    turns: 6,
  }))
  const template = document.specification.sequence
  specification.former.pins = pins
  specification.sequence = Array.from({ length: STEPS }, (_, index): SequenceStep => {
    const source = template[index % template.length]!
    const windingId = `w${(index % WINDINGS) + 1}`
    return { ...source, id: `s${index + 1}`, remark: index % 7 === 0 ? 'Wickelanfang mit Schlauch λ = 3 mm überziehen; étanchéité vérifiée après cuisson à 125 °C' : source.remark, ...('windingId' in source && { windingId, turns: 1 }) } as SequenceStep
  })
  const test = specification.tests[0]!
  specification.tests = Array.from({ length: TESTS }, (_, index) => ({
    ...specification.tests[index % specification.tests.length]!,
    id: `t${index + 1}`,
    number: index + 1,
    symbol: `L${index + 1} – Streuinduktivität`,
    instrumentClass: '0.1 % basic accuracy',
    openTerminals: ['4', '7', '8', '10', '11', '13'],
    biasA: index % 2 === 0 ? 2.25 : null,
    method: index % 3 === 0 ? 'IEC 61007:2020, 4.4.5, with the fixture of the related document and four-terminal connection' : test.method,
  }))
  specification.notes = Array.from({ length: 9 }, (_, index) =>
    row(`n${index + 1}`, { number: index + 1, fields: [], text: 'Die Lackierung darf die Mittelschenkelflächen nicht benetzen; θ ≤ 125 °C während ≥ 2 h. '.repeat(index === 4 ? 6 : 2).trim() }),
  )
  specification.title.legalOwner = stated('Brightmoor Power Works (Magnetics and Harbour Instruments Division) Limited')
  specification.title.title = stated('Transformer, flyback, ten windings, with interleaved primary and screens')
  specification.title.supplementaryTitle = stated('Λιμενικό τροφοδοτικό 100–240 V, épreuve de surcharge, größte Ausführung')
  specification.title.partNumber = stated('BM-T-4710-01-EXTENDED-VARIANT')
  return document
}
