/** npx tsx tests/e2e/support/take-pictures.ts ORIGIN MAIL PASSWORD PATH… – pictures and axe of some sheets. `-` for nobody. */
import { launchChromium } from '../../support/chromium'
import { expectNoSeriousAxe, openAs, openPage, picture, scrollsSideways } from './pictures'

const [origin, email, password, ...paths] = process.argv.slice(2)
if (!origin || !email || !password || paths.length === 0) throw new Error('usage: take-pictures ORIGIN MAIL PASSWORD PATH…')

const browser = await launchChromium()
const page = email === '-' ? await openPage(browser, origin) : await openAs(browser, origin, { email, password })
page.on('pageerror', (error) => console.error(`script error: ${error.message}`))
page.on('console', (message) => {
  if (message.type() === 'error' || message.type() === 'warning') console.error(`console: ${message.text()}`)
})

for (const path of paths) {
  await page.goto(path)
  await page.getByRole('heading', { level: 1 }).waitFor()
  const who = email === '-' ? 'nobody' : email.split('@')[0]
  await picture(page, `${who}${path.replace(/[^a-z0-9]+/gi, '-').replace(/-$/, '')}`)
  await page.setViewportSize({ width: 390, height: 844 })
  if (await scrollsSideways(page)) console.error(`${path} scrolls sideways at 390 px`)
  await page.setViewportSize({ width: 1440, height: 900 })
  await expectNoSeriousAxe(page).catch((error: Error) => console.error(error.message))
}
await browser.close()
