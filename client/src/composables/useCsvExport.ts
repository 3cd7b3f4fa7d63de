import { saveFile } from '@/api/download'
import { toCsv, type SheetColumn } from '@/components/base/sheet-columns'

/** Saves the rows shown as a CSV file. */
export function useCsvExport() {
  return <R>(name: string, rows: readonly R[], columns: readonly SheetColumn<R>[]) =>
    saveFile(`${name}.csv`, new Blob([toCsv(rows, columns)], { type: 'text/csv;charset=utf-8' }))
}
