/** A reason to stop that is the reader's to solve: shown as a sentence, without a stack. */
export class Refusal extends Error {}

export const say = (text: string) => console.log(text)

/** Says what was done and how long it took. */
export async function timed(done: string, work: () => Promise<unknown>): Promise<void> {
  const start = Date.now()
  await work()
  say(`${done} (${seconds(Date.now() - start)}).`)
}

export const seconds = (milliseconds: number) => `${(milliseconds / 1000).toFixed(1)} s`

export const lastLines = (text: string, count = 12) => text.trimEnd().split('\n').slice(-count).join('\n')
