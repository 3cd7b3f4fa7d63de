/** Writes shared/drawing/glyph-widths.ts from the font files: `npx tsx server/pdf/write-glyph-widths.ts`. */
import { writeFileSync } from 'node:fs'
import type { FontRole } from '#shared/drawing/model'
import { measureGlyphs } from './measure-glyphs'

const roles: FontRole[] = ['sans', 'sans-bold', 'mono']
const entries = roles.map((role) => {
  const runs = measureGlyphs(role).map(([first, widths]) => `    [0x${first.toString(16)}, [${widths.join(',')}]],`)
  return `  ${role.includes('-') ? `'${role}'` : role}: [\n${runs.join('\n')}\n  ],`
})

writeFileSync(
  new URL('../../shared/drawing/glyph-widths.ts', import.meta.url),
  `import type { FontRole } from './model'

/** Runs of neighbouring code points: the first one, then the advance width of each in thousandths of the em. */
export type GlyphTable = readonly (readonly [first: number, widths: readonly number[]])[]

/** IBM Plex Sans Regular and SemiBold, IBM Plex Mono Regular. Written by server/pdf/write-glyph-widths.ts. */
export const GLYPH_WIDTHS: Record<FontRole, GlyphTable> = {
${entries.join('\n')}
}
`,
)
