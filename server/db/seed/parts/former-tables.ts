/**
 * What is known of one-section coil formers, by core. Columns: window area, winding width, winding height and mean
 * length of turn in mm² and mm, number of pins; `-`: not known.
 *
 * Window areas, widths and mean lengths of turn: recalled values of typical one-section formers, to be checked
 * against a live data sheet; ETD34/17/11 was read from Dixon, Unitrode seminar SLUP127, page 5-14. Pins: TDK, Ferrite
 * Cores catalogue 1998, bobbin tables, or recalled.
 */
export interface KnownFormers {
  confidence: 'high' | 'medium' | 'low'
  source: string
  edition: string
  rows: string
}

const RECALLED = 'Typical one-section coil former, recalled'

export const KNOWN_FORMERS: readonly KnownFormers[] = [
  {
    confidence: 'high',
    source: 'Dixon, Magnetics design for switching power supplies, Unitrode seminar SLUP127, page 5-14',
    edition: 'Not dated',
    rows: `
  ETD34/17/11 123 21.0 6.0 61.0 14
`,
  },
  {
    confidence: 'medium',
    source: RECALLED,
    edition: 'None',
    rows: `
  E25/13/7     61 15.6 - 50   10
  E30/15/7     90 17.1 - 56   -
  E16/8/5    22.3 -    - 34   -
  E20/10/6     34 -    - 41.2 -
  E32/16/9  108.5 -    - 64.4 -
  E42/21/15   178 -    - 87   -
  E42/21/20   178 -    - 100  -
  ETD29/16/10  97 19.4 - 52.8 14
  ETD39/20/13 178 25.7 - 69   16
  ETD44/22/15 210 29.5 - 77.7 18
  ETD49/25/16 269 32.7 - 86   20
  ETD54/28/19 316 36.8 - 96   22
  ETD59/31/22 366 41.2 - 106  24
  RM4         7.7 -    - 20   6
  RM5         9.5 -    - 25   6
  RM6          15 -    - 30   6
  RM8          30 -    - 42   12
  RM10       41.5 -    - 52   12
  RM12         73 -    - 61   12
  RM14        107 -    - 71   12
  EFD15/8/5  14.8 -    - 26   8
  EFD20/10/7 27.7 -    - 34.1 10
  EFD25/13/9 40.2 -    - 46.4 10
  EFD30/15/9 52.3 -    - 52.9 12
`,
  },
  {
    confidence: 'low',
    source: RECALLED,
    edition: 'None',
    rows: `
  P14/8       9.4 -    - 29   6
  P18/11       17 -    - 35.6 6
  P22/13     23.4 -    - 44   6
  P26/16       32 -    - 52   6
  P30/19       48 -    - 60   6
  P36/22       63 -    - 73   -
  PQ20/16    23.5 -    - 44   14
  PQ20/20      36 -    - 44   14
  PQ26/20      31 -    - 56   12
  PQ26/25      47 -    - 56   12
  PQ32/20      44 -    - 66.7 12
  PQ32/30      99 -    - 66.7 12
  PQ35/35     142 -    - 74   12
  PQ40/40     189 -    - 83   12
`,
  },
]

/** Pins only. TDK, Ferrite Cores catalogue 1998, bobbin tables. */
export const KNOWN_PINS: Readonly<Record<string, number>> = {
  EP7: 6,
  EP10: 8,
  EP13: 10,
  EP17: 8,
  EP20: 10,
  'P9/5': 6,
  'P11/7': 6,
  'PQ50/50': 12,
  'ER28/14/11': 10,
  'ER28/17/11': 10,
  EER35L: 12,
  'ER40/22/13': 12,
  EER42: 14,
}
