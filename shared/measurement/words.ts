/** Words of test reports. Compared without case, blanks, full stops and surrounding marks. */

const plain = (text: string) =>
  text
    .normalize('NFKC')
    .toLowerCase()
    .replace(/[\s.:_]/g, '')

const wordSet = (...words: string[]) => {
  const set = new Set(words.map(plain))
  return (text: string) => set.has(plain(text))
}

export const isPassWord = wordSet('pass', 'passed', 'ok', 'o.k.', 'go', 'good', 'yes', 'ja', 'oui', 'i.O.', 'io', 'bestanden', 'conforme', '合格', '✔', '✓', '√')
export const isFailWord = wordSet('fail', 'failed', 'ng', 'nok', 'not ok', 'no go', 'no-go', 'nogo', 'bad', 'n.i.O.', 'nio', 'ko', 'nicht bestanden', 'non conforme', '不合格', '✘', '✗', '✕')
/** Could be a verdict: asked about. */
export const isUnsureVerdict = wordSet('p', 'f', 'y', 'n', '1', '0', 'x', 'true', 'false')
export const isEmptyWord = wordSet('', '-', '–', '—', 'n/a', 'na', 'none', '/', 'not measured', 'not tested', 'n.m.')
export const isOverRangeWord = wordSet('ol', 'over', 'overload', 'overrange', 'over range', 'ovld', 'ovfl', '∞', '+∞', 'inf', '+inf', 'infinity', 'open')

/** Three or more dashes: how many instruments print a reading beyond their range. */
export const isDashedOut = (text: string): boolean => /^[-–—]{3,}$/.test(text)

/** Error values of a spreadsheet's formulas. */
export const isFormulaError = (text: string): boolean => /^#(REF|DIV\/0|N\/A|VALUE|NAME|NUM|NULL|BEZUG|WERT|ZAHL)[!?]?$/i.test(text)

const MONTH = '(jan|feb|mar|mär|apr|may|mai|jun|jul|aug|sep|oct|okt|nov|dec|dez)[a-zä]*'
const DATE = new RegExp(`^(\\d{1,2}[-./ ]*${MONTH}([-./ ]*\\d{2,4})?|${MONTH}[-./ ]*\\d{1,4}|\\d{4}-\\d{2}-\\d{2}|\\d{1,2}[./]\\d{1,2}[./]\\d{2,4})\\.?$`, 'i')

/** A date where a number should be: spreadsheets turn `1.2` into one. */
export const looksLikeDate = (text: string): boolean => DATE.test(text)

export const isSerialHeading = wordSet('serial', 'serial no', 'serial number', 'ser no', 'ser', 's/n', 'sn', 'no', 'nr', 'number', '#', 'sample', 'sample no', 'part', 'part no', 'piece', 'pcs', 'id', 'dut', 'specimen', 'seriennummer', 'muster', 'teil', '序号', '编号')
/** Heads the column of characteristics when parts stand in columns. */
export const isCharacteristicHeading = wordSet('', 'characteristic', 'parameter', 'test', 'item', 'symbol', 'measurement', 'serial', 'merkmal')
export const isIgnoredHeading = wordSet('remark', 'remarks', 'comment', 'comments', 'note', 'notes', 'operator', 'date', 'time', 'result', 'judgement', 'judgment', 'verdict', 'status', 'station', 'pass/fail', 'bemerkung', 'prüfer', 'datum')

const SUMMARY: Readonly<Record<string, SummaryFigure>> = {
  avg: 'mean', average: 'mean', mean: 'mean', mittelwert: 'mean', mw: 'mean', 'x̄': 'mean', xbar: 'mean',
  min: 'minimum', minimum: 'minimum', max: 'maximum', maximum: 'maximum',
  std: 'deviation', stdev: 'deviation', 'std dev': 'deviation', s: 'deviation', sigma: 'deviation', σ: 'deviation', sd: 'deviation',
  cpk: 'capability', ppk: 'capability', cp: 'other', pp: 'other', ca: 'other', median: 'other', range: 'other', n: 'other', count: 'other', sum: 'other', total: 'other', yield: 'other',
}
export type SummaryFigure = 'mean' | 'minimum' | 'maximum' | 'deviation' | 'capability' | 'other'
const SUMMARY_BY_WORD = new Map(Object.entries(SUMMARY).map(([word, figure]) => [plain(word), figure]))

/** The figure that a line below the readings sums up, or null when it is no such line. */
export const summaryFigure = (text: string): SummaryFigure | null => SUMMARY_BY_WORD.get(plain(text)) ?? null

const LIMITS: Readonly<Record<string, LimitSide>> = {
  min: 'minimum', minimum: 'minimum', lsl: 'minimum', lower: 'minimum', 'lower limit': 'minimum', low: 'minimum', 'spec min': 'minimum', untergrenze: 'minimum',
  nom: 'nominal', nominal: 'nominal', target: 'nominal', typ: 'nominal', typical: 'nominal', std: 'nominal', standard: 'nominal', sollwert: 'nominal',
  max: 'maximum', maximum: 'maximum', usl: 'maximum', upper: 'maximum', 'upper limit': 'maximum', high: 'maximum', 'spec max': 'maximum', obergrenze: 'maximum',
}
export type LimitSide = 'minimum' | 'nominal' | 'maximum'
const LIMIT_BY_WORD = new Map(Object.entries(LIMITS).map(([word, side]) => [plain(word), side]))

/** The limit that a line above the readings states, or null when it is no such line. */
export const limitSide = (text: string): LimitSide | null => LIMIT_BY_WORD.get(plain(text)) ?? null

/** A line between the headings and the readings that states a condition, not a reading. */
export const isConditionWord = wordSet('unit', 'units', 'einheit', '单位', 'spec', 'specification', 'tolerance', 'tol', 'limit', 'limits', 'freq', 'frequency', 'level', 'voltage', 'condition', 'conditions', 'pins', 'pin', 'method', 'temp', 'temperature', 'instrument')
