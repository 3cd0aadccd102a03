import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { demoSeries } from '../../main/demo/demo-series.ts'
import { expect, test } from '../pages/program.ts'
import type { Locator, Page } from '@playwright/test'

/** Presses Tab until the wanted element has the focus, as somebody without a mouse does; fails after a full round. */
async function tabTo(page: Page, wanted: Locator, key = 'Tab'): Promise<void> {
  for (let presses = 0; presses < 80; presses++) {
    if (
      await wanted.evaluate((element) => element === document.activeElement || element.contains(document.activeElement)).catch(() => false)
    )
      return
    await page.keyboard.press(key)
  }
  throw new Error(`The focus never came to ${wanted.toString()}`)
}

test.use({ permissions: ['clipboard-read', 'clipboard-write'] })

test('from the empty sheet to the copied table without a mouse', async ({ sheet, page }) => {
  await tabTo(page, sheet.openDemoButton)
  await page.keyboard.press('Enter')
  await sheet.settled()

  await tabTo(page, page.getByRole('tab', { selected: true }))
  await page.keyboard.press('End')
  await expect(page.getByRole('tab', { name: 'Activation energy' })).toHaveAttribute('aria-selected', 'true')

  await tabTo(page, sheet.rail)
  await page.keyboard.press('Home')
  await expect(sheet.rail).toHaveAttribute('aria-valuenow', '0.05')
  await page.keyboard.press('ArrowRight')
  await page.keyboard.press('ArrowRight')
  await expect(sheet.rail).toHaveAttribute('aria-valuenow', '0.15')
  await expect(sheet.currentRow).toContainText('0.15')
  await expect(sheet.readOut).toContainText('0.15')
  await page.keyboard.press('End')
  await expect(sheet.rail).toHaveAttribute('aria-valuenow', '0.95')

  await tabTo(page, page.getByRole('region', { name: 'Table of activation energies' }), 'Shift+Tab')
  await page.keyboard.press('ArrowUp')
  await expect(sheet.rail).toHaveAttribute('aria-valuenow', '0.9')
  await page.keyboard.press('Control+c')
  await expect.poll(() => page.evaluate(() => navigator.clipboard.readText())).toMatch(/^α\t?/)

  await tabTo(page, page.getByRole('button', { name: 'Export table (CSV)' }))
  const out = await sheet.downloads(2, () => page.keyboard.press('Enter'))
  expect(out.has('activation.csv')).toBe(true)
})

test('files are opened, a bad one is refused and dismissed, and all is undone without a mouse', async ({ sheet, page, folder }) => {
  const good = demoSeries().files.map(({ fileName, bytes }) => {
    writeFileSync(join(folder, fileName), bytes)
    return join(folder, fileName)
  })
  const bad = join(folder, 'no numbers.csv')
  writeFileSync(bad, 'Time (min),Temperature (K),Mass (mg)\n1,2,three\n')

  const chooser = page.waitForEvent('filechooser')
  await page.keyboard.press('Control+o')
  await (await chooser).setFiles([...good, bad])
  await sheet.settled()
  await expect(page.getByRole('alert')).toContainText('no numbers.csv')
  await tabTo(page, page.getByRole('button', { name: 'Dismiss' }))
  await page.keyboard.press('Enter')
  await expect(page.getByRole('alert')).toHaveCount(0)
  await expect(sheet.runsTable.getByRole('row')).toHaveCount(good.length + 1)

  await page.reload()
  await sheet.settled()
  await expect(sheet.runsTable.getByRole('row')).toHaveCount(good.length + 1)
  await page.keyboard.press('Control+z')
  await expect(sheet.openDemoButton).toBeVisible()
})

test('a run is left out and taken back without a mouse', async ({ sheet, page }) => {
  await tabTo(page, sheet.openDemoButton)
  await page.keyboard.press('Enter')
  await sheet.settled()
  await sheet.page.getByRole('tab', { selected: true }).focus()
  await page.keyboard.press('Home')
  await tabTo(page, page.getByRole('checkbox', { name: /^Use/ }).first())
  await page.keyboard.press('Space')
  await expect(page.getByRole('button', { name: /^Undo: leaving out/ })).toBeVisible()
  await page.keyboard.press('Control+z')
  await expect(page.getByRole('checkbox', { name: /^Use/ }).first()).toBeChecked()
})

test('a stop or caution is reached from the top line', async ({ sheet, page }) => {
  await sheet.openDemo()
  const count = page.getByRole('button', { name: /\d+ (caution|note)/ }).first()
  await tabTo(page, count)
  await page.keyboard.press('Enter')
  await expect(page.getByRole('complementary').locator(':focus')).toHaveCount(1)
})

test('the focus can always be seen', async ({ sheet, page }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  let stops = 0
  for (let presses = 0; presses < 40; presses++) {
    await page.keyboard.press('Tab')
    const focus = await page.evaluate(() => {
      const element = document.activeElement
      if (element === null || element === document.body) return null
      // A ring may be drawn by the element itself or by one just around or inside it.
      const near = [element, element.parentElement, ...element.querySelectorAll(':scope > *')].filter((one) => one !== null)
      const marked = near.some((one) => {
        const style = getComputedStyle(one)
        return (style.outlineStyle !== 'none' && Number.parseFloat(style.outlineWidth) >= 2) || style.boxShadow !== 'none'
      })
      return { name: element.outerHTML.slice(0, 120), marked }
    })
    if (focus === null) continue
    stops += 1
    expect(focus.marked, `no ring on ${focus.name}`).toBe(true)
  }
  expect(stops).toBeGreaterThan(20)
})
