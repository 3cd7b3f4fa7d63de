import { shippedLibrary } from '#server/db/seed/parts/library'
import { PART_KINDS } from '#shared/contracts/part-rows'
import type { AnyLibraryRow, LibraryKind } from '#shared/engine/library'
import { importColumns } from '#shared/parts/import-columns'
import { partCell } from '#shared/parts/part-cells'
import { readPartTable, type KnownParts } from '#shared/parts/read-part-table'
import { describe, expect, it } from 'vitest'

const library = shippedLibrary()
const rowsOf = (kind: LibraryKind): readonly AnyLibraryRow[] =>
  ({ core: library.cores, former: library.formers, material: library.materials, wire: library.wires, tape: library.tapes, sleeve: library.sleeves })[kind]
const known = (rows: readonly AnyLibraryRow[] = []): KnownParts => ({ rows: new Map(rows.map((row) => [row.id, row])), coreIds: new Set(library.cores.map(({ id }) => id)) })

const quoted = (text: string) => `"${text.replaceAll('"', '""')}"`
const table = (headings: readonly string[], rows: readonly (readonly string[])[], separator = ',') => new TextEncoder().encode([headings, ...rows].map((row) => row.map(quoted).join(separator)).join('\r\n'))
const textOf = (row: AnyLibraryRow, path: string, comma = false) => {
  const cell = partCell(row, path)
  return cell === null ? '' : typeof cell === 'number' && comma ? String(cell).replace('.', ',') : String(cell)
}

const SLEEVE = ['id', 'name', 'source', 'edition', 'confidence', 'material', 'boreMm', 'wallMm', 'thermalClassC', 'withstandVRms']
const sleeve = (change: Partial<Record<string, string>> = {}) => {
  const cells: Partial<Record<string, string>> = { id: 's1', name: 'Sleeve 1', source: 'Data sheet', edition: '2024', confidence: 'high', material: 'PTFE', boreMm: '1.5', wallMm: '0.4', thermalClassC: '180', withstandVRms: '', ...change }
  return SLEEVE.map((path) => cells[path]!)
}
const read = (...rows: string[][]) => readPartTable(table(SLEEVE, rows), 'sleeve', known())

describe('the columns of a kind', () => {
  it('lead to every field of every shipped row', () => {
    for (const kind of PART_KINDS) {
      const columns = importColumns(kind)
      for (const { path } of columns) expect(() => rowsOf(kind).forEach((row) => partCell(row, path)), path).not.toThrow()
    }
  })

  it('say what a new row needs', () => {
    const needed = importColumns('former').filter(({ required }) => required).map(({ path }) => path)
    expect(needed).toEqual(expect.arrayContaining(['id', 'coreId', 'tube.shape', 'pinSection.sizeMm', 'envelopeMm.length']))
    expect(needed).not.toContain('meanTurnLengthMm')
    expect(needed).not.toContain('pins')
    expect(importColumns('material').find(({ path }) => path === 'saturation')).toMatchObject({ holds: 'lines', required: true, keys: ['temperatureC', 'fluxDensityT'] })
  })
})

describe('the shipped library, written as a table and read again', () => {
  it.each(PART_KINDS.flatMap((kind) => [{ kind, separator: ',', comma: false }, { kind, separator: ';', comma: true }]))('is unchanged: $kind with $separator, decimal comma $comma', ({ kind, separator, comma }) => {
    const rows = rowsOf(kind)
    const paths = importColumns(kind).map(({ path }) => path)
    const found = readPartTable(table(paths, rows.map((row) => paths.map((path) => textOf(row, path, comma))), separator), kind, known(rows))
    expect(found.problems).toEqual([])
    expect(found.lines.filter(({ state }) => state !== 'unchanged')).toEqual([])
    expect(found.lines).toHaveLength(rows.length)
  })
})

describe('reading rows', () => {
  it('tells new rows from changed and unchanged ones, and names what changed', () => {
    const row = library.sleeves[0]!
    const found = readPartTable(table(['id', ...SLEEVE.slice(1)], [sleeve(), SLEEVE.map((path) => (path === 'boreMm' ? '9.25' : textOf(row, path)))]), 'sleeve', known([row]))
    expect(found.lines.map(({ line, state, changes }) => ({ line, state, changes }))).toEqual([
      { line: 2, state: 'new', changes: [] },
      { line: 3, state: 'changed', changes: ['boreMm'] },
    ])
    expect(found.lines[1]!.draft).toMatchObject({ boreMm: 9.25, note: row.note, unverified: [...row.unverified] })
  })

  it('keeps what an existing row has in a column that was left out, whatever the decimal sign of the file', () => {
    const row = { ...library.sleeves[0]!, withstandVRms: 1250.125 }
    const without = SLEEVE.filter((path) => path !== 'withstandVRms')
    const cells = without.map((path) => (path === 'wallMm' ? '0,75' : textOf(row, path, true)))
    const { lines } = readPartTable(table(without, [cells], ';'), 'sleeve', known([row]))
    expect(lines[0]).toMatchObject({ state: 'changed', changes: ['wallMm'], draft: { withstandVRms: 1250.125, wallMm: 0.75 } })
  })

  it('reads a byte order mark, exponents and a text that a spreadsheet was kept from running', () => {
    const text = `\ufeff${SLEEVE.join(';')}\n${sleeve({ boreMm: '1,5e0', wallMm: '4E-1', name: "'=Sleeve" }).join(';')}\n`
    expect(readPartTable(new TextEncoder().encode(text), 'sleeve', known()).lines[0]!.draft).toMatchObject({ boreMm: 1.5, wallMm: 0.4, name: '=Sleeve' })
  })

  it('takes nested lists as JSON and leaves out what a shape has not', () => {
    const former = library.formers[0]!
    const paths = importColumns('former').map(({ path }) => path)
    const cells = paths.map((path) => (path === 'pins' ? '[{"number":"1","xMm":0,"yMm":2.54}]' : textOf(former, path)))
    const { lines } = readPartTable(table(paths, [cells]), 'former', known([former]))
    expect(lines[0]).toMatchObject({ state: 'changed', changes: ['pins'], draft: { pins: [{ number: '1', xMm: 0, yMm: 2.54 }], tube: former.tube } })
  })
})

describe('what does not fit', () => {
  it.each([
    { name: 'a word for a number', change: { boreMm: 'wide' }, column: 'boreMm', says: /“wide” is not a number/ },
    { name: 'a number with its unit', change: { boreMm: '1.5 mm' }, column: 'boreMm', says: /“mm” is not expected/ },
    { name: 'a date for a number', change: { boreMm: '01-Feb' }, column: 'boreMm', says: /is a date/ },
    { name: 'a negative length', change: { boreMm: '-1' }, column: 'boreMm', says: /above zero/ },
    { name: 'an empty cell that is needed', change: { boreMm: '' }, column: 'boreMm', says: /empty/ },
    { name: 'a confidence that does not exist', change: { confidence: 'sure' }, column: 'confidence', says: /one of: high, medium, low, generic/ },
    { name: 'an identifier with a slash', change: { id: 'a/b' }, column: 'id', says: /small letters/ },
    { name: 'a generic row without doubts', change: { confidence: 'generic' }, column: 'unverified', says: /names the fields/ },
  ])('says line and column of $name', ({ change, column, says }) => {
    const { lines } = read(sleeve(change))
    expect(lines[0]).toMatchObject({ line: 2, state: 'unfit', draft: null, problems: [{ column }] })
    expect(lines[0]!.problems[0]!.message).toMatch(says)
  })

  it('asks about a number with two readings unless the file settles it', () => {
    const cells = (boreMm: string, wallMm: string) => sleeve({ boreMm, wallMm, thermalClassC: '180' })
    const undecided = readPartTable(table(SLEEVE, [cells('1,250', '1')], ';'), 'sleeve', known())
    expect(undecided.lines[0]!.problems[0]).toMatchObject({ column: 'boreMm', message: expect.stringMatching(/1\.250 or 1250/) })
    const settled = readPartTable(table(SLEEVE, [cells('1,250', '0,4')], ';'), 'sleeve', known())
    expect(settled.lines[0]!.draft).toMatchObject({ boreMm: 1.25 })
  })

  it('says what is wrong inside a list of records, and what is no list', () => {
    const material = library.materials[0]!
    const paths = importColumns('material').map(({ path }) => path)
    const with_ = (saturation: string) => readPartTable(table(paths, [paths.map((path) => (path === 'saturation' ? saturation : textOf(material, path)))]), 'material', known())
    expect(with_('[{"temperatureC":25,"fluxDensityT":0.5},{"temperatureC":100,"fluxDensityT":9}]').lines[0]!.problems).toEqual([{ column: 'saturation', message: 'Entry 2, fluxDensityT: Enter a flux density up to 5 T.' }])
    expect(with_('25: 0.5').lines[0]!.problems[0]!.message).toContain('[{"temperatureC": …, "fluxDensityT": …}]')
  })

  it('refuses a figure of another shape, and a core that is not there', () => {
    const former = library.formers.find(({ tube }) => tube.shape === 'round')!
    const paths = importColumns('former').map(({ path }) => path)
    const with_ = (change: Record<string, string>) => readPartTable(table(paths, [paths.map((path) => change[path] ?? textOf(former, path))]), 'former', known()).lines[0]!.problems
    expect(with_({ 'tube.widthMm': '4' })).toEqual([{ column: 'tube.widthMm', message: expect.stringContaining('Leave this cell empty') }])
    expect(with_({ coreId: 'no-such-core' })).toEqual([{ column: 'coreId', message: expect.stringContaining('no core') }])
  })

  it('refuses the second line of an identifier', () => {
    const { lines } = read(sleeve(), sleeve({ boreMm: '2' }))
    expect(lines.map(({ state }) => state)).toEqual(['new', 'unfit'])
    expect(lines[1]!.problems[0]).toMatchObject({ column: 'id', message: expect.stringContaining('line 2') })
  })

  it.each([
    { name: 'a missing column', text: SLEEVE.filter((path) => path !== 'boreMm').join(';') + '\nx', column: 'boreMm', says: /is missing/ },
    { name: 'an unknown column', text: `${SLEEVE.join(';')};price\nx`, column: 'price', says: /no field/ },
    { name: 'a heading that is there twice', text: `${SLEEVE.join(';')};boreMm\nx`, column: 'boreMm', says: /twice/ },
    { name: 'cells without a heading', text: `${SLEEVE.join(';')};\n${sleeve().join(';')};7`, column: 'column 11', says: /no heading/ },
    { name: 'headings alone', text: SLEEVE.join(';'), column: '', says: /only headings/ },
    { name: 'a quotation mark without its end', text: `${SLEEVE.join(';')}\n"x`, column: '', says: /quotation mark/ },
    { name: 'no text at all', text: ' \r\n ', column: '', says: /empty/ },
  ])('refuses the table for $name', ({ text, column, says }) => {
    const { problems, lines } = readPartTable(new TextEncoder().encode(text), 'sleeve', known())
    expect(lines).toEqual([])
    expect(problems[0]).toMatchObject({ column, message: expect.stringMatching(says) })
  })

  it('refuses bytes that are no text, and more rows than it takes', () => {
    expect(readPartTable(Uint8Array.of(0x50, 0x4b, 3, 4, 0x14, 0, 6, 0), 'sleeve', known()).problems[0]!.message).toContain('CSV')
    const many = Array.from({ length: 2001 }, (_, index) => sleeve({ id: `s${index}` }))
    expect(read(...many).problems[0]!.message).toContain('2000')
  })
})
