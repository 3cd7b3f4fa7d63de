/** Asks the person to sign in again in place; true when the call may be repeated. */
type SessionGate = () => Promise<boolean>

let gate: SessionGate | null = null
let asking: Promise<boolean> | null = null

/** Set once at start, so that `api/` needs to know nothing of stores and dialogs. */
export function setSessionGate(ask: SessionGate | null): void {
  gate = ask
  asking = null
}

/** Calls that fail together wait for the same answer. */
export function passSessionGate(): Promise<boolean> {
  if (!gate) return Promise.resolve(false)
  asking ??= gate().finally(() => {
    asking = null
  })
  return asking
}
