import { existsSync } from 'node:fs'
import { chromium, type Browser } from 'playwright-core'

const CANDIDATES = [process.env.CHROMIUM, '/usr/bin/chromium', '/usr/bin/chromium-browser']

/** Path of the installed Chromium. @throws Error saying what to install */
export function chromiumPath(): string {
  const found = CANDIDATES.find((file) => file && existsSync(file))
  if (!found) throw new Error('Chromium not found. Install it (apt-get install chromium), or set CHROMIUM to its path.')
  return found
}

/** A browser that speaks to nobody but the pages it is sent to. Root needs `--no-sandbox`. */
export function launchChromium(): Promise<Browser> {
  return chromium.launch({
    executablePath: chromiumPath(),
    args: [
      '--headless',
      '--no-sandbox',
      '--disable-gpu',
      '--disable-dev-shm-usage',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  })
}
