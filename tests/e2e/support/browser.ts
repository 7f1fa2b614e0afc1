import { existsSync } from 'node:fs'
import { chromium } from 'playwright-core'
import type { Browser } from 'playwright-core'

const EXECUTABLE = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'].find(existsSync)

/** Debian's Chromium, without any connection of its own. */
export async function startBrowser(): Promise<Browser> {
  if (!EXECUTABLE) throw new Error('Chromium is missing. On Debian, as root: apt-get install --no-install-recommends chromium')
  return chromium.launch({
    executablePath: EXECUTABLE,
    args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'],
  })
}

export const PHONE = { width: 360, height: 780 }
export const DESK = { width: 1280, height: 900 }
