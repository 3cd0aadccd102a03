import { AxeBuilder } from '@axe-core/playwright'
import { expect, test } from '../pages/program.ts'
import type { Page } from '@playwright/test'

/** Everything axe finds at WCAG 2.2 AA, in a form that a failure can be read from. */
async function faults(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa']).analyze()
  return violations.flatMap(({ id, help, nodes }) => nodes.map((node) => `${id}: ${help}: ${node.html.slice(0, 160)}`))
}

for (const colorScheme of ['light', 'dark'] as const) {
  test.describe(`${colorScheme} paper`, () => {
    test.use({ colorScheme })

    test('axe finds nothing on the empty sheet', async ({ sheet, page }) => {
      await expect(sheet.openDemoButton).toBeVisible()
      expect(await faults(page)).toEqual([])
    })

    test('axe finds nothing where the uncertainty comes from, nor beside peaks and single runs', async ({ sheet, page }) => {
      await sheet.openDemo()
      await sheet.goTo('Activation energy')
      await sheet.option('Interval', 'Bootstrap').click()
      await sheet.option('Evidence', 'Where the uncertainty comes from').click()
      await expect(sheet.budgetTable).toBeVisible()
      await sheet.option('Table', 'Peaks and single runs').click()
      await expect(sheet.peakTable).toBeVisible()
      expect(await faults(page)).toEqual([])
    })

    test('axe finds nothing on the two stages, in a menu and beside a refused file', async ({ sheet, page }) => {
      await sheet.openDemo()
      await sheet.goTo('Runs')
      expect(await faults(page)).toEqual([])
      await sheet.goTo('Activation energy')
      expect(await faults(page)).toEqual([])
      await sheet.chooseMethod('Vyazovkin')
      expect(await faults(page)).toEqual([])
      await page.getByRole('button', { name: 'Study' }).click()
      expect(await faults(page)).toEqual([])
      await page.keyboard.press('Escape')
      await page.getByLabel('Files to open').setInputFiles([{ name: 'empty.csv', mimeType: 'text/csv', buffer: Buffer.from('') }])
      await expect(page.getByRole('alert')).toBeVisible()
      expect(await faults(page)).toEqual([])
    })
  })
}

test('nothing is cut off or overlaps at 900 by 600 and at twice the size', async ({ sheet, page }) => {
  await sheet.openDemo()
  for (const [width, height] of [
    [900, 600],
    [720, 450],
  ] as const) {
    await page.setViewportSize({ width, height })
    for (const stage of ['Runs', 'Activation energy'] as const) {
      await sheet.goTo(stage)
      const overflow = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
      expect(overflow, `${stage} at ${width} by ${height} scrolls sideways`).toBeLessThanOrEqual(0)
      await expect(sheet.rail).toBeInViewport()
    }
  }
})
