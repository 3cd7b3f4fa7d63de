import type { Confidence } from '../library'
import type { Impregnation, WireInsulation } from '../specification'

/** Relative permittivity of an insulating material at power frequencies up to about 1 MHz. */
export interface Permittivity {
  value: number
  /** Class of material that it belongs to. */
  material: string
  source: string
  confidence: Confidence
}

const generic = (material: string, value: number): Permittivity => ({
  value,
  material,
  source: 'handbook value of the material class at 25 °C, 1 kHz to 1 MHz, from memory',
  confidence: 'generic',
})

/** Enamels of IEC 60317: polyurethane, polyester-imide, polyamide-imide lie at 3.2 to 4. */
const ENAMEL = generic('wire enamel', 3.5)

/** Extruded fluoropolymer and polyester layers of triple-insulated wire lie at 2.2 to 3.4. */
const EXTRUDED = generic('extruded wire insulation', 2.8)

const AIR: Permittivity = { value: 1, material: 'air', source: 'definition of the electric constant', confidence: 'high' }

/** Whole of what a name of a material may say, first match counts. */
const BY_WORD: readonly (readonly [word: string, permittivity: Permittivity])[] = [
  ['polyimide', generic('polyimide film', 3.4)],
  ['kapton', generic('polyimide film', 3.4)],
  ['aramid', generic('aramid paper', 2.6)],
  ['polyester', generic('polyester film', 3.3)],
  ['pet', generic('polyester film', 3.3)],
  ['ptfe', generic('PTFE', 2.1)],
  ['glass', generic('glass cloth', 4.5)],
  ['phenol', generic('phenolic moulding compound', 5)],
  ['liquid crystal', generic('liquid-crystal polymer', 3.9)],
  ['lcp', generic('liquid-crystal polymer', 3.9)],
  ['pbt', generic('polyester moulding compound', 3.5)],
  ['polyamide', generic('polyamide', 4)],
  ['epoxy', generic('epoxy', 3.8)],
  ['parylene', generic('parylene', 2.9)],
]

/** Where no word of the material's name is known. */
const UNKNOWN = generic('plastic, class not known', 3.5)

/** By the words of the material's name. Source: each value carries its own. */
export function permittivityOf(material: string): Permittivity {
  const words = material.toLowerCase()
  return BY_WORD.find(([word]) => words.includes(word))?.[1] ?? UNKNOWN
}

export function wirePermittivity(insulation: WireInsulation): Permittivity {
  if (insulation === 'triple-insulated') return EXTRUDED
  return insulation === 'bare' ? AIR : ENAMEL
}

/** What fills the space between wires: resin where the process drives the air out, else air. */
export function fillPermittivity(impregnation: Impregnation): Permittivity {
  const process = impregnation.process.value
  return process === 'vacuum' || process === 'potting' ? generic('impregnating resin', 3.5) : AIR
}
