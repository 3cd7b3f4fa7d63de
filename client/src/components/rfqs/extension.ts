/** A later due time with its reason. */
export interface Extension {
  dueAt: string
  reason: string
}
