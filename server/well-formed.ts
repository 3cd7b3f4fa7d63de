/** Text whose lone surrogates are replaced by U+FFFD and which is in normalization form C, as UTF-8 and hashes need it. */
export const wellFormed = (text: string): string => text.replace(/[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/g, '\uFFFD').normalize('NFC')
