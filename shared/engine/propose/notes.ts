import { isInsulatedWire } from '../evaluate/insulation-paths'
import type { Note, WindingSpecification } from '../specification'
import type { Design } from './design'
import { PROPOSED } from './stated'

/** Numbered notes of the drawing, each with the fields it belongs to. */
export function planNotes(specification: WindingSpecification, design: Design): Note[] {
  const named = (of: (winding: Design['windings'][number]) => boolean) => design.windings.filter(of).map(({ name }) => name)
  const litz = named(({ strands }) => strands > 1)
  const tracking = named(({ partnerId }) => partnerId !== null)
  const insulated = specification.windings.filter(isInsulatedWire)
  const texts: { text: string; fields: string[] }[] = [
    { text: 'All windings are wound in one direction. A dot marks the start of a winding.', fields: ['windings'] },
    { text: 'The core halves are seated without adhesive, tape or flash between the ground faces.', fields: ['core.assembly'] },
    { text: 'The core is floating and belongs to the primary side.', fields: ['core.potential'] },
    ...(design.interleaved ? [{ text: 'The primary is wound in two halves in series, the secondaries between them.', fields: ['sequence'] }] : []),
    ...(tracking.length > 0 ? [{ text: `${tracking.join(' and ')} are wound in neighbouring layers of the same wire, so that their outputs track.`, fields: ['sequence'] }] : []),
    ...(litz.length > 0 ? [{ text: `The ends of the litz of ${litz.join(', ')} are tinned through all strands before they are wrapped round the pin.`, fields: ['windings'] }] : []),
    ...(design.method === 'margin-tape' ? [{ text: 'Margin tape is built up to the height of the winding beside it. Leads that cross a margin are sleeved into the winding.', fields: ['sequence'] }] : []),
    ...(insulated.length > 0 ? [{ text: `Insulated winding wire of ${insulated.map(({ name }) => name).join(', ')} is certified for reinforced insulation; the vendor declares certificate and maker. Its stripped ends keep the distances of the boundary list to the core and to the other side, and do not cross bare leads under tension.`, fields: ['windings'] }] : []),
    { text: 'No change of material, process, site or sub-supplier without written approval.', fields: [] },
  ]
  return texts.map(({ text, fields }, index) => ({ id: `n${index + 1}`, status: 'mandatory', origin: PROPOSED, number: index + 1, text, fields }))
}
