import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { outlineDxf } from '#server/dxf/outline-dxf'
import { evaluate } from '#shared/engine/index'
import { pdfPictures } from '../support/pdf-tools'
import { buoySupply, coupledInductor, mainsFlyback, sampleLibrary } from '../support/sample-specification'
import { stressPart } from '../support/stress-specification'

/** Opens the DXF of each sample part in LibreCAD and prints it; what LibreCAD cannot read leaves no print. */
const PICTURES = '.pictures/office'
const folder = mkdtempSync(join(tmpdir(), 'dotside-office-'))
const LIMIT_MS = 120_000

/** Null when nothing was printed; LibreCAD shows a message and waits on a file that it cannot read. */
function print(name: string, dxf: string, limitMs: number): Buffer | null {
  const [source, target] = [join(folder, `${name}.dxf`), join(folder, `${name}.pdf`)]
  writeFileSync(source, dxf)
  const env = { ...process.env, HOME: folder, XDG_RUNTIME_DIR: folder, QT_QPA_PLATFORM: 'offscreen' }
  const { error } = spawnSync('librecad', ['dxf2pdf', '-a', '-m', '-o', target, source], { env, timeout: limitMs })
  if (error && (error as NodeJS.ErrnoException).code !== 'ETIMEDOUT') throw error
  return existsSync(target) ? readFileSync(target) : null
}

/** A print without ink compresses to next to nothing. */
const LEAST_PICTURE_BYTES = 2000

function judge(name: string, make: typeof mainsFlyback): boolean {
  const document = make()
  const { specification } = document
  const printed = print(name, outlineDxf({ specification, library: sampleLibrary, layout: evaluate(document, sampleLibrary).layout, revision: 'B', specificationHash: null }), LIMIT_MS)
  const [picture] = printed ? pdfPictures(printed, 96) : []
  if (picture) writeFileSync(join(PICTURES, `${name}.png`), picture)
  const passed = picture !== undefined && picture.length > LEAST_PICTURE_BYTES
  console.log(`${passed ? 'passed' : 'FAILED'}  LibreCAD opens and prints the outline of ${name}`)
  return passed
}

mkdirSync(PICTURES, { recursive: true })
try {
  const garbage = print('garbage', 'this is no drawing', LIMIT_MS / 6) === null
  console.log(`${garbage ? 'passed' : 'FAILED'}  LibreCAD prints nothing of what is no DXF, so that a print means something`)
  const results = [garbage, ...Object.entries({ mainsFlyback, buoySupply, coupledInductor, stressPart }).map(([name, make]) => judge(name, make))]
  const failed = results.filter((passed) => !passed).length
  console.log(`${results.length - failed} passed, ${failed} failed, 0 skipped`)
  process.exitCode = failed === 0 ? 0 : 1
} finally {
  rmSync(folder, { recursive: true, force: true })
}
