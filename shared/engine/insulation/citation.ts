/** How a value was come by: read in a copy that is not the publisher's, there and in a second one, or recalled. None was read in the standard itself. */
export type Basis = 'read' | 'cross-checked' | 'memory'
export type Confidence = 'high' | 'medium' | 'low'

/** Where a required value comes from. The edition in force and the certification body decide, not this record. */
export interface Citation {
  standard: string
  edition: string
  place: string
  basis: Basis
  confidence: Confidence
}

const iec60664 = (place: string, basis: Basis = 'read', confidence: Confidence = 'high'): Citation => ({
  standard: 'IEC 60664-1', edition: '2020', place, basis, confidence,
})

/** Citations of the tables and rules of this folder. */
export const CITATIONS = {
  ratedImpulse: iec60664('Table F.1'),
  impulseClearance: iec60664('Table F.2, case A'),
  homogeneousClearance: iec60664('Table F.2, case B'),
  recurringPeakClearance: iec60664('Table F.8'),
  altitude: iec60664('Table A.2'),
  creepage: iec60664('Table F.5', 'cross-checked'),
  reinforcedClearance: iec60664('clearances of reinforced insulation'),
  reinforcedPeak: iec60664('160 % of the recurring peak', 'memory'),
  materialGroups: iec60664('material groups by comparative tracking index'),
  grooves: iec60664('groove width X'),
  highFrequencyClearance: { standard: 'IEC 62368-1', edition: '2018', place: 'Table 11', basis: 'read', confidence: 'medium' },
  audioVideoSolid: { standard: 'IEC 62368-1', edition: '2018', place: '5.4.4.2 and 5.4.4.6', basis: 'read', confidence: 'high' },
  audioVideoWithstand: { standard: 'IEC 62368-1', edition: '2018', place: '5.4.9.1, Table 25', basis: 'memory', confidence: 'medium' },
  audioVideoWorkingPeak: { standard: 'IEC 62368-1', edition: '2018', place: '5.4.9.1, Table 26', basis: 'memory', confidence: 'medium' },
  audioVideoTemporary: { standard: 'IEC 62368-1', edition: '2018', place: '5.4.9.1, Table 27', basis: 'memory', confidence: 'medium' },
  transformerTest: { standard: 'IEC 61558-1', edition: '2005', place: 'Table 8a', basis: 'memory', confidence: 'medium' },
  transformerTestLowest: { standard: 'IEC 61558-1', edition: '2005', place: 'Table 8a, first row', basis: 'memory', confidence: 'low' },
  householdTest: { standard: 'IEC 60335-1', edition: '2010', place: 'Table 4', basis: 'memory', confidence: 'medium' },
  householdDistances: { standard: 'IEC 60335-1', edition: '2010', place: '29.1 and 29.2', basis: 'memory', confidence: 'medium' },
  householdSolidLayers: { standard: 'IEC 60335-1', edition: '2010', place: '29.3', basis: 'memory', confidence: 'medium' },
  medicalMeans: { standard: 'IEC 60601-1', edition: '2005+A1+A2', place: 'Tables 6 and 12 to 16, row of 250 V rms', basis: 'read', confidence: 'high' },
  medicalSolid: { standard: 'IEC 60601-1', edition: '2005+A1+A2', place: '8.8.2', basis: 'memory', confidence: 'medium' },
  wireWithoutInterleaf: { standard: 'IEC 62368-1', edition: '2018', place: 'Annex J', basis: 'memory', confidence: 'medium' },
} as const satisfies Record<string, Citation>
