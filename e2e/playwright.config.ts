import { defineConfig } from '@playwright/test'
import { findBrowser } from './browser.mjs'

const executablePath = process.env.CHROMIUM_PATH ?? (await findBrowser()) ?? undefined

export default defineConfig({
  testDir: 'journeys',
  outputDir: 'results/journeys',
  fullyParallel: false,
  workers: 2,
  timeout: 60_000,
  expect: { timeout: 10_000 },
  forbidOnly: true,
  // all-tests.mjs reads the JSON; a person at a terminal reads the list.
  reporter: process.env.PLAYWRIGHT_JSON_OUTPUT_FILE === undefined ? [['list']] : [['list'], ['json']],
  use: {
    viewport: { width: 1440, height: 900 },
    trace: 'retain-on-failure',
    launchOptions: {
      ...(executablePath === undefined ? {} : { executablePath }),
      // A machine without a network answers Chromium's own look-ups with errors; they are switched off.
      args: ['--disable-background-networking', '--disable-component-update', '--disable-sync', '--disable-quic', '--no-first-run'],
    },
  },
})
