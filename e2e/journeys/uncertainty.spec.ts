import { demoSeries } from '../../main/demo/demo-series.ts'
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Locator } from '@playwright/test'
import type { Sheet } from '../pages/sheet.ts'
import { expect, test } from '../pages/program.ts'

test.use({ permissions: ['clipboard-read', 'clipboard-write'] })

/** The first number of a text, with a true minus sign or none. */
const numberIn = (text: string | null): number => Number(/[\d.]+/.exec(text ?? '')?.[0])
/** Half the width of the interval at the level, as the table shows it. */
const halfWidth = async (sheet: Sheet): Promise<number> => numberIn(await sheet.currentRow.getByRole('cell').nth(1).textContent())
/** u(Ea) of a source, as the budget shows it. */
const u = async (sheet: Sheet, source: string): Promise<number> =>
  numberIn(await sheet.budgetRow(source).getByRole('cell').nth(1).textContent())

test('the kind of interval that is chosen is named, and chart, table, rail and read-out follow it', async ({ sheet }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  const right = sheet.page.getByRole('region', { name: 'Activation energy against conversion' })
  await expect(right).toContainText('Student-t of the regression, n − 2 degrees of freedom (3 here), 95 %, pointwise.')
  await expect(sheet.readOut).toContainText('bars: ± 95 %, Student-t')
  const own = await halfWidth(sheet)
  // A line method has no F-type interval: it is no choice.
  await expect(sheet.option('Interval', 'F-type')).toHaveCount(0)

  await sheet.option('Interval', 'Combined').click()
  await expect(right).toContainText('Scatter and measured sources combined, 95 %, pointwise, approximate.')
  await expect(sheet.readOut).toContainText('bars: ± 95 %, combined')
  const combined = await halfWidth(sheet)
  expect(combined).toBeGreaterThan(own)
  await expect(sheet.readOut).toContainText(`± ${combined.toFixed(1)} kJ/mol`)

  await sheet.option('Interval', 'Jackknife').click()
  await expect(right).toContainText('Jackknife over runs, 95 %, pointwise, approximate.')
  await expect(right).toContainText('Each of 5 runs left out once')

  await sheet.chooseMethod('Vyazovkin')
  await sheet.option('Interval', 'F-type').click()
  await expect(right).toContainText('F-type interval of Vyazovkin and Wight, 95 %, pointwise, approximate.')
  // Phi shows the ends of that interval in place of Student's.
  await expect.poll(async () => sheet.told(/^Φ/)).toMatch(/Lower end, 95 % \(F-type\)/)
})

test('where the uncertainty comes from is shown at the level, changed, undone, copied and exported', async ({ sheet, page }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  await sheet.option('Evidence', 'Where the uncertainty comes from').click()
  await sheet.option('Interval', 'Combined').click()
  const common = sheet.budgetRow('Temperature, common to all runs')
  await expect(common).toContainText('assumed: nobody has stated it')
  const parts = [await u(sheet, 'Scatter of the runs'), await u(sheet, 'Temperature, common to all runs'), await u(sheet, 'Thermal lag')]
  const whole = await u(sheet, 'Combined')
  expect(Math.hypot(...parts)).toBeCloseTo(whole, 1)

  // The rail moves it.
  await sheet.dragRailTo(0.9)
  await expect.poll(() => u(sheet, 'Combined')).not.toBe(whole)
  await sheet.dragRailTo(0.5)
  await expect.poll(() => u(sheet, 'Combined')).toBe(whole)

  // Ten times the common error: ten times its share of Ea, and a wider interval.
  const before = await halfWidth(sheet)
  const field = page.getByRole('textbox', { name: 'Stated: temperature, common to all runs' })
  await field.fill('-1 K')
  await field.press('Enter')
  await expect(field).toHaveAttribute('aria-invalid', 'true')
  await field.fill('5 K')
  await field.press('Enter')
  await expect(common).toContainText('as stated')
  await expect.poll(() => u(sheet, 'Temperature, common to all runs')).toBeCloseTo(10 * (parts[1] ?? Number.NaN), 0)
  await expect.poll(() => halfWidth(sheet)).toBeGreaterThan(before)
  await page.getByRole('button', { name: 'Undo: stated uncertainties' }).click()
  await expect(common).toContainText('assumed: nobody has stated it')
  await expect.poll(() => halfWidth(sheet)).toBe(before)

  await page.getByRole('button', { name: 'Copy budget' }).click()
  await expect.poll(() => page.evaluate(() => navigator.clipboard.readText())).toContain('0.5 K assumed: nobody has stated it\t')
  await page.getByRole('button', { name: 'Copy table' }).click()
  await expect.poll(() => page.evaluate(() => navigator.clipboard.readText())).toContain('± 95 % Starink, combined (kJ/mol)')

  const out = await sheet.downloads(2, () => page.getByRole('button', { name: 'Export table (CSV)' }).click())
  expect(out.get('activation.csv')?.split('\n')[0]).toMatch(/jackknife|Jackknife/)
  expect(out.get('activation.csv.txt')).toContain('Scatter and measured sources combined')
  await expect(page.getByText(/^Saved .*, with every kind of interval\.$/)).toBeVisible()
})

test('a budget copied right after a change waits for the numbers that belong to it', async ({ sheet, page }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  await sheet.option('Evidence', 'Where the uncertainty comes from').click()
  await expect.poll(() => u(sheet, 'Thermal lag')).toBeGreaterThan(0)
  await page.evaluate(() => navigator.clipboard.writeText(''))
  const field = page.getByRole('textbox', { name: 'Stated: thermal lag' })
  await field.fill('0 s')
  await field.press('Enter')
  await page.getByRole('button', { name: 'Copy budget' }).click()
  const clipboard = async (): Promise<string> => page.evaluate(() => navigator.clipboard.readText())
  await expect.poll(clipboard).not.toBe('')
  expect(await clipboard()).toMatch(/Thermal lag\t0 s [^\t]*\t0\.000\t/)
})

test('three runs are too few for resampling, and the sheet says so', async ({ sheet, page, folder }) => {
  const files = demoSeries().files.slice(0, 3)
  for (const { fileName, bytes } of files) writeFileSync(join(folder, fileName), bytes)
  await sheet.chooseFiles(files.map(({ fileName }) => join(folder, fileName)))
  await sheet.settled()
  await sheet.goTo('Activation energy')
  await expect(page.getByText('Jackknife: needs 4 runs, here 3. Bootstrap: needs 4 distinct programmes, here 3.')).toBeVisible()
  await expect(sheet.option('Interval', 'Jackknife')).toBeDisabled()
})

const gasConstant_J_per_mol_K = 8.314462618

/** A first-order mass loss (60 kJ/mol, 1e5 1/s) heated at a constant rate from 300 K, its thermometer off by so many kelvin. */
function massLoss(rate_K_per_min: number, error_K: number): string {
  const parts = 20
  const lines = ['Time (s),Temperature (°C),Mass (mg)']
  let reacted = 0
  for (let T_K = 300; T_K <= 700; T_K++) {
    const time_s = (60 * (T_K - 300)) / rate_K_per_min
    lines.push(`${time_s.toFixed(2)},${(T_K + error_K - 273.15).toFixed(2)},${(3 + 7 * Math.exp(-reacted)).toFixed(5)}`)
    for (let part = 0; part < parts; part++) {
      const k_per_s = 1e5 * Math.exp(-60_000 / (gasConstant_J_per_mol_K * (T_K + (part + 0.5) / parts)))
      reacted += (k_per_s * 60) / rate_K_per_min / parts
    }
  }
  return [...lines, ''].join('\n')
}

test('an interval that reaches below 0 says so where it stands, is heard and is copied', async ({ sheet, page, folder }) => {
  const paths = [2, 5, 10].map((rate) => join(folder, `loss ${rate} K per min.csv`))
  for (const [i, path] of paths.entries()) writeFileSync(path, massLoss([2, 5, 10][i] ?? 0, i === 1 ? 25 : 0))
  await sheet.chooseFiles(paths)
  await sheet.settled()
  await sheet.goTo('Activation energy')
  const words = /reaches below 0, where no activation energy lies: these runs do not bound Ea from below/
  await expect(page.getByRole('list', { name: 'Remarks on the interval' })).toHaveText(words)
  await expect(sheet.currentRow.getByRole('cell').nth(1)).toHaveAttribute('title', words)
  await expect(sheet.currentRow.getByRole('cell').nth(1)).toContainText(words)
  await expect(sheet.rail).toHaveAttribute('aria-valuetext', words)
  await expect(page.getByText(/^Interval of the mean: reaches below 0/)).toBeVisible()
  await page.getByRole('button', { name: 'Copy table' }).click()
  await expect.poll(() => page.evaluate(() => navigator.clipboard.readText())).toMatch(words)
  await sheet.option('Evidence', 'Where the uncertainty comes from').click()
  await expect(page.getByText(/^Student-t(, [a-z]+)* interval: reaches below 0/)).toBeVisible()
  await sheet.option('Table', 'Peaks and single runs').click()
  await expect(sheet.peakTable.getByRole('row', { name: /^Kissinger/ })).toContainText(words)
})

test('the value that was assumed, typed by a person, is stated from then on', async ({ sheet, page }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  await sheet.option('Evidence', 'Where the uncertainty comes from').click()
  const common = sheet.budgetRow('Temperature, common to all runs')
  await expect(common).toContainText('assumed: nobody has stated it')
  const field = page.getByRole('textbox', { name: 'Stated: temperature, common to all runs' })
  await expect(field).toHaveValue('0.5 K')
  await field.focus()
  await page.keyboard.press('Enter')
  await expect(common).toContainText('assumed: nobody has stated it')
  await page.keyboard.press('Control+A')
  await page.keyboard.type('0.5 K')
  await page.keyboard.press('Enter')
  await expect(common).toContainText('as stated')
  await expect(field).toHaveValue('0.5 K')
  await expect(sheet.budgetRow('Temperature, run by run')).toContainText('assumed: nobody has stated it')
  const out = await sheet.downloads(2, () => page.getByRole('button', { name: 'Export table (CSV)' }).click())
  expect(out.get('activation.csv.txt')).toMatch(/common to all runs[^\n]*0\.5 K, as stated/i)
  expect(out.get('activation.csv.txt')).toMatch(/0\.5 K in each run, assumed, nothing stated/)
  await page.getByRole('button', { name: 'Undo: stated uncertainties' }).click()
  await expect(common).toContainText('assumed: nobody has stated it')
})

test('the line through the peaks stands at the left while a peak method is looked at', async ({ sheet, page }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  await sheet.option('Table', 'Peaks and single runs').click()
  await expect(sheet.chart('Straight line through the peaks')).toBeVisible()
  const left = page.getByRole('region', { name: 'Straight line through the peaks' })
  await expect(left).toContainText('Kissinger: ln(β/Tp²) against 1000/Tp; the slope is −Ea/R.')
  const Ea =
    (await sheet.peakTable
      .getByRole('row', { name: /^Kissinger/ })
      .getByRole('cell')
      .first()
      .textContent()) ?? ''
  await expect(left).toContainText(new RegExp(`Ea ${Ea} ± [\\d.]+ kJ/mol \\(95 % Student-t, 3 degrees of freedom\\)`))
  expect(await sheet.told('Straight line through the peaks')).toMatch(/2 K\/min: 1000\/Tp 1\.\d+ 1\/K, ln\(β\/Tp²\) −?-?12\.\d+/)

  await sheet.option('Method', 'ASTM E698').click()
  await expect(sheet.peakTable.getByRole('row', { name: /^ASTM E698/ })).toHaveAttribute('aria-current', 'true')
  await expect(left).toContainText('ASTM E698: log β against 1000/Tp')
  await sheet.peakTable.getByRole('row', { name: /^Augis–Bennett Does/ }).click()
  await expect(left).toContainText('There is no line to draw.')

  await sheet.option('Table', 'Every level').click()
  await expect(sheet.chart('Straight lines at each conversion')).toBeVisible()
  await sheet.option('Evidence', 'Peaks').click()
  await expect(sheet.peakTable).toBeVisible()
})

test('peaks and single runs stand in a table of their own, with what to know before relying on them', async ({ sheet, page }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  await sheet.option('Table', 'Peaks and single runs').click()
  await expect(sheet.peakTable.getByRole('row', { name: /^Kissinger/ })).toContainText('peaks at α')
  const e698 = sheet.peakTable.getByRole('row', { name: /^ASTM E698/ })
  await expect(e698).toContainText(/half-life of 60 min [\d.]+ ±\s[\d.]+ °C/)
  await expect(sheet.peakTable.getByRole('row', { name: /^Augis–Bennett Does/ })).toContainText('does not change the mass')
  await page.getByRole('region', { name: 'Table of peak and single-run methods' }).focus()
  await page.keyboard.press('ArrowDown')
  await expect(e698).toHaveAttribute('aria-current', 'true')
  await expect(page.getByText(/To confirm: age a sample for 60 min.*does not replace tests/)).toBeVisible()
  await page.getByRole('button', { name: 'Copy table' }).click()
  await expect.poll(() => page.evaluate(() => navigator.clipboard.readText())).toMatch(/^Method\tRun\tEa \(kJ\/mol\)/)
})

/** Of the rows of a table that its head or its lower edge cuts: how far they reach beyond either. */
const rowsCut = (frame: Locator): Promise<readonly number[]> =>
  frame.evaluate((element) => {
    const { top, bottom } = element.getBoundingClientRect()
    const head = top + (element.querySelector('thead')?.offsetHeight ?? 0)
    return [...element.querySelectorAll('tbody tr')].flatMap((row) => {
      const box = row.getBoundingClientRect()
      const above = box.bottom > head + 2 && box.top < head - 2
      const below = box.top < bottom - 2 && box.bottom > bottom + 2
      return above || below ? [box.top - head, box.bottom - bottom] : []
    })
  })

test('no row of the peak methods is cut, whichever is picked out', async ({ sheet, page }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  await page.getByRole('radio', { name: 'Peaks and single runs' }).click()
  const frame = page.getByRole('region', { name: 'Table of peak and single-run methods' })
  const rows = await sheet.peakTable.getByRole('row').count()
  expect(rows).toBeGreaterThan(6)
  await frame.focus()
  for (const key of [
    ...Array.from({ length: rows - 2 }, () => 'ArrowDown'),
    'Home',
    'End',
    ...Array.from({ length: rows - 2 }, () => 'ArrowUp'),
  ]) {
    await page.keyboard.press(key)
    await expect(sheet.peakTable.locator('tr[aria-current="true"]')).toBeInViewport({ ratio: 0.9 })
    await expect.poll(() => rowsCut(frame)).toEqual([])
  }
  await frame.hover()
  for (const notches of [60, 140, 90, -70, 400, -160]) {
    await page.mouse.wheel(0, notches)
    await expect.poll(() => rowsCut(frame)).toEqual([])
  }
})
