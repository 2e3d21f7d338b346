import { existsSync } from 'node:fs'
import type { Browser, Page } from 'playwright-core'
import { chromium } from 'playwright-core'

/** `CHROMIUM_PATH`, else Debian's, else the one from the npm registry. */
async function chromiumPath(): Promise<string> {
  if (process.env.CHROMIUM_PATH) return process.env.CHROMIUM_PATH
  if (existsSync('/usr/bin/chromium')) return '/usr/bin/chromium'
  const { default: packaged } = await import('@sparticuz/chromium')
  return packaged.executablePath()
}

export async function launch(): Promise<Browser> {
  const executablePath = await chromiumPath()
  return chromium
    .launch({ executablePath, args: ['--no-sandbox', '--disable-background-networking', '--no-first-run'] })
    .catch((error: Error) => {
      throw new Error(
        `Chromium at ${executablePath} does not start: install Debian's package chromium, or set CHROMIUM_PATH. ${error.message}`,
      )
    })
}

/** Messages of the software WebGL driver about its own speed; nothing of ours. */
const DRIVER = /GL Driver Message|GPU stall/

/** Collects what the page complains about: console errors and warnings, uncaught errors, requests to other hosts. */
export function watchPage(page: Page, origin: string): string[] {
  const complaints: string[] = []
  page.on('console', (message) => {
    if (['error', 'warning'].includes(message.type()) && !DRIVER.test(message.text()))
      complaints.push(`${message.type()}: ${message.text()}`)
  })
  page.on('pageerror', (error) => complaints.push(`uncaught: ${error.message}`))
  page.on('request', (request) => {
    const url = request.url()
    if (!url.startsWith(origin) && !url.startsWith('data:') && !url.startsWith('blob:'))
      complaints.push(`request to another host: ${url}`)
  })
  return complaints
}
