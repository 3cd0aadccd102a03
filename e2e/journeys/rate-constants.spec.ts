import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { axeFaults } from '../pages/axe-faults.ts'
import { expect, test } from '../pages/program.ts'
import { RateConstantSheet } from '../pages/rate-constant-sheet.ts'

// F. Daniels, E. H. Johnston, J. Am. Chem. Soc. 43 (1921) 53, N2O5: 24.7 kcal/mol (103 kJ/mol) in the paper. The data were written down from memory of it and
// recomputed with NumPy: Ea 102.8979 ± 0.4713 kJ/mol (standard error), A 3.8163e13 1/s, r² 0.999916.
const n2o5 = 'T (K)\tk (1/s)\n273\t7.87e-7\n298\t3.46e-5\n308\t1.35e-4\n318\t4.98e-4\n328\t1.50e-3\n338\t4.87e-3\n'

/** A table of exported text by the headings of its columns. */
function rowsOf(csv: string): readonly Readonly<Record<string, string>>[] {
  const [head = [], ...rows] = csv
    .trim()
    .split(/\r?\n/)
    .map((line) => Array.from(line.matchAll(/(?:^|,)(?:"([^"]*)"|([^,]*))/g), (match) => match[1] ?? match[2] ?? ''))
  return rows.map((cells) => Object.fromEntries(head.map((name, i) => [name, cells[i] ?? ''])))
}

/** `3.59 × 10−5` as a number. */
const numberIn = (text: string | undefined): number => Number((text ?? '').replaceAll('−', '-').replace(/\s*×\s*10/, 'e'))

test('a pasted table gives Ea, a unit is changed and taken back, and the exported table says what the screen says', async ({
  sheet,
  page,
}) => {
  const rates = new RateConstantSheet(page)
  await rates.paste(n2o5)
  await expect(page.getByText('6 rows, temperature in K, k in 1/s.')).toBeVisible()
  await rates.take()
  await rates.goTo('Activation energy')
  expect(await rates.parameter('Ea kJ/mol')).toEqual(['102.90', '0.47', '101.59', '104.21'])
  await expect(page.getByText(/^A 3\.82 × 1013 1\/s \(95 %: /)).toBeVisible()
  expect(numberIn((await rates.parameter('A 1/s'))[0])).toBe(3.82e13)
  await expect(page.getByText('r² 0.99992')).toBeVisible()

  // Per minute Ea stays and ln A gains ln 60 = 4.0943.
  const lnA = numberIn((await rates.parameter('ln A (A in 1/s)'))[0])
  await rates.goTo('Rate constants')
  await page.getByRole('button', { name: 'Convert k to 1/min' }).click()
  await rates.settled()
  await rates.goTo('Activation energy')
  expect((await rates.parameter('Ea kJ/mol'))[0]).toBe('102.90')
  expect(numberIn((await rates.parameter('ln A (A in 1/min)'))[0])).toBeCloseTo(lnA + 4.0943, 1)
  await page.getByRole('button', { name: /^Undo/ }).click()
  await expect.poll(() => rates.parameter('A 1/s')).not.toEqual([])

  await rates.predictAt('25 C; 100 C')
  await expect(rates.predictions.getByRole('row')).toHaveCount(3)
  const shown = await rates.predictions.getByRole('row').nth(1).getByRole('cell').allTextContents()
  await expect(rates.predictions.getByRole('rowheader', { name: /^373.15 K/ })).toContainText('35 K above')
  await expect(page.getByText('it does not replace tests on the real amount')).toBeVisible()

  const out = await sheet.downloads(2, () => page.getByRole('button', { name: 'Export table (CSV)' }).click())
  expect([...out.keys()].sort()).toEqual(['rate-constants.csv', 'rate-constants.csv.txt'])
  const rows = rowsOf(out.get('rate-constants.csv') ?? '')
  const Ea = rows.find((row) => row['quantity'] === 'Ea')
  expect(['value', 'standard error', 'lower 95 %', 'upper 95 %'].map((name) => Number(Ea?.[name]).toFixed(2))).toEqual(
    await rates.parameter('Ea kJ/mol'),
  )
  const predicted = rows.filter((row) => row['quantity'] === 'k, predicted' && Number(row['temperature (K)']) === 298.15)
  expect(Number(Number(predicted[0]?.['value']).toPrecision(3))).toBe(numberIn(shown[0]))
  const [lower = '', upper = ''] = ['lower 95 %', 'upper 95 %'].map((name) => (Number(predicted[0]?.[name]) * 1e5).toFixed(2))
  expect(shown[1]).toContain(`${lower} … ${upper}`)
  expect(out.get('rate-constants.csv.txt')).toContain('estimate for planning')
})

test('without a mouse: rows are typed, a bad cell keeps its text and says why, and the rail steps through the temperatures', async ({
  sheet,
  page,
}) => {
  const rates = new RateConstantSheet(page)
  await expect(sheet.openDemoButton).toBeVisible()
  const typeIt = page.getByRole('button', { name: 'type it' })
  await typeIt.focus()
  await page.keyboard.press('Enter')
  await expect(rates.cell('Temperature', 'new')).toBeFocused()
  const type = async (temperature: string, k: string): Promise<void> => {
    await page.keyboard.type(temperature)
    await page.keyboard.press('Tab')
    await page.keyboard.type(k)
    await page.keyboard.press('Enter')
  }
  // The worked example of 2 HI = H2 + I2 in Chemistry 2e (OpenStax), recomputed: 185.3079 ± 2.1774 kJ/mol.
  await type('555 K', '3,52e-7 L/(mol s)')
  await expect(rates.cell('k', 1)).toHaveValue('3.52e-7')
  await expect(page.getByLabel('Unit of k')).toHaveValue('L/(mol s)')
  await type('575 K', 'fast')
  await expect(page.getByRole('alert')).toContainText('k: “fast” is no number')
  await expect(rates.cell('Temperature', 'new')).toHaveValue('575 K')
  await expect(rates.cell('k', 'new')).toHaveAttribute('aria-invalid', 'true')
  await rates.cell('k', 'new').fill('1.22×10⁻⁶')
  await page.keyboard.press('Enter')
  await expect(rates.cell('k', 2)).toHaveValue('1.22e-6')
  await expect(page.getByText('without an interval: that needs three temperatures')).toBeVisible()
  await expect(rates.cell('Temperature', 'new')).toBeFocused()
  await type('645 K', '8.59e-5')
  await type('700 K', '1.16e-3')
  await type('781 K', '3.95e-2')
  await expect(page.getByText('Ea 185.3 ± 6.9 kJ/mol')).toBeVisible()

  await page.getByRole('tab', { selected: true }).focus()
  await page.keyboard.press('End')
  await rates.rail.focus()
  await page.keyboard.press('End')
  await expect(rates.readOut).toContainText('507.9 °C')
  await expect(rates.lineTable.locator('tr[aria-current="true"]')).toContainText('507.85')
  await page.keyboard.press('Home')
  await expect(rates.readOut).toContainText('281.9 °C')
  await page.keyboard.press('Control+z')
  await expect(page.getByText('4 rate constants', { exact: true })).toBeVisible()
})

test('what a table does not say is asked, and a refused paste keeps its text until it is mended', async ({ sheet, page }) => {
  const rates = new RateConstantSheet(page)
  await expect(sheet.openDemoButton).toBeVisible()
  await rates.paste('25 3.46e-5\n35 slow\n45 4.98e-4')
  await expect(page.getByRole('alert')).toContainText('may be K, °C or °F')
  await page.getByRole('button', { name: 'Temperatures are in °C' }).click()
  await expect(page.getByRole('alert')).toContainText('Line 2')
  const text = page.getByLabel('Text of the table')
  await expect(text).toHaveValue('25 3.46e-5\n35 slow\n45 4.98e-4')
  await text.fill('25 3.46e-5\n35 1.35e-4\n45 4.98e-4')
  await expect(page.getByText('3 rows, temperature in °C, k without a unit.')).toBeVisible()
  await page.getByLabel('Unit of k, if you know it').fill('s-1')
  await page.keyboard.press('Enter')
  await expect(page.getByText('3 rows, temperature in °C, k in 1/s.')).toBeVisible()
  await rates.take()

  // More rows pasted into a cell are offered, and join the table in its own unit.
  await rates.cell('Temperature', 'new').focus()
  await rates.paste('T (K)\tk (1/min)\n328.15\t0.09\n')
  await page.getByRole('button', { name: 'Add 1 row' }).click()
  await expect(rates.cell('Temperature', 4)).toHaveValue('55')
  await expect(rates.cell('k', 4)).toHaveValue('1.5e-3')
  await page.getByRole('button', { name: /^Undo/ }).click()
  await expect(rates.cell('k', 4)).toHaveCount(0)
})

test('a dropped file that holds no run but a table of rate constants is offered as one', async ({ sheet, page, folder }) => {
  const rates = new RateConstantSheet(page)
  const path = join(folder, 'N2O5 decay.csv')
  writeFileSync(path, n2o5.replaceAll('\t', ','))
  await sheet.drop([path])
  await expect(page.getByRole('heading', { name: 'Rate constants in N2O5 decay.csv' })).toBeVisible()
  await rates.take()
  await expect(page.getByLabel('Name of the study')).toHaveValue('N2O5 decay')
  await expect(page.getByText('Ea 102.9 ± 1.3 kJ/mol')).toBeVisible()
})

test('isothermal runs give rate constants with a chosen model, beside their Ea against conversion', async ({ sheet, page, folder }) => {
  const rates = new RateConstantSheet(page)
  // First order, Ea 100 kJ/mol, k 2e-3 1/s at 140 °C: exact, held from the first row.
  const paths = [120, 130, 140].map((celsius) => {
    const k = 2e-3 * Math.exp((100_000 / 8.314462618) * (1 / 413.15 - 1 / (celsius + 273.15)))
    const rows = Array.from({ length: 400 }, (_, i) => {
      const time = (i * 4) / 400 / k
      return `${time.toFixed(4)},${celsius},${(1 - Math.exp(-k * time)).toFixed(9)}`
    })
    const path = join(folder, `hold ${celsius} C.csv`)
    writeFileSync(path, `Time (s),Temperature (°C),Conversion\n${rows.join('\n')}\n`)
    return path
  })
  await sheet.drop(paths)
  await sheet.settled()
  await page.getByRole('button', { name: 'Rate constants of these holds, with a model…' }).click()
  await page.getByRole('combobox', { name: /Reaction model/ }).selectOption('F1')
  await page.getByRole('button', { name: 'Make the table' }).click()
  await rates.settled()
  expect(numberIn((await rates.parameter('Ea kJ/mol'))[0])).toBeCloseTo(100, 1)

  // The model of the simulation follows the holds; one that does not is said to, and the ranking leads back.
  await expect(rates.model('F1')).toContainText('chosen')
  await expect(rates.model('F1')).toContainText('fits')
  await page.getByRole('button', { name: 'Take D1', exact: true }).click()
  await rates.settled()
  await expect(rates.model('D1')).toContainText('chosen')
  await expect(page.getByRole('heading', { name: 'D1 does not follow 3 of 3 holds' })).toBeVisible()
  await expect(page.getByRole('heading', { name: 'F1 fits the holds better than D1' })).toBeVisible()
  await page.getByRole('radio', { name: 'Fits of the holds' }).click()
  await expect(rates.holdTable.getByRole('row')).toHaveCount(4)
  await expect(rates.holdTable.getByText('systematic', { exact: true })).toHaveCount(3)
  await page.getByRole('region', { name: 'Table of fits of the holds' }).press('End')
  await expect(rates.readOut).toContainText('140 °C')
  await expect(rates.holdTable.locator('tr[aria-current="true"]')).toContainText('hold 140 C')
  expect(await axeFaults(page)).toEqual([])
  await page.getByRole('tab', { name: 'Runs' }).click()
  await page.getByRole('button', { name: 'Make them again…' }).click()
  await expect(page.getByRole('combobox', { name: /Reaction model/ })).toHaveValue('D1')
  await expect(page.getByText(/models that fit the holds .*: F1\./)).toBeVisible()
  await page.getByRole('button', { name: /^Undo/ }).click()
  await page.getByRole('button', { name: 'Show their line' }).click()
  await expect(rates.model('F1')).toContainText('chosen')
  await page.getByRole('radio', { name: 'Levels of conversion' }).click()
  await expect(sheet.rail).toBeVisible()
  await page.getByRole('radio', { name: 'Rate constants' }).click()
  await expect(rates.rail).toBeVisible()
  await page.getByRole('button', { name: /^Undo/ }).click()
  await expect(sheet.rail).toBeVisible()
})

for (const colorScheme of ['light', 'dark'] as const) {
  test.describe(`${colorScheme} paper`, () => {
    test.use({ colorScheme })

    test('axe finds nothing on the stages of rate constants, in a bad cell and in an offer', async ({ sheet, page }) => {
      const rates = new RateConstantSheet(page)
      await expect(sheet.openDemoButton).toBeVisible()
      await rates.paste('25 3.46e-5\n35 1.35e-4')
      await expect(page.getByRole('alert')).toBeVisible()
      expect(await axeFaults(page)).toEqual([])
      await page.getByLabel('Text of the table').fill(n2o5)
      await rates.take()
      await rates.cell('k', 2).fill('fast')
      await page.keyboard.press('Enter')
      await expect(page.getByRole('alert')).toBeVisible()
      expect(await axeFaults(page)).toEqual([])
      await page.keyboard.press('Escape')
      await rates.goTo('Activation energy')
      await rates.predictAt('25 C, 100 C')
      await expect(rates.predictions).toBeVisible()
      expect(await axeFaults(page)).toEqual([])
    })
  })
}

test('a power that lost its height is asked about in a cell, and an interval that reaches below 0 is said to bound nothing', async ({
  sheet,
  page,
}) => {
  const rates = new RateConstantSheet(page)
  await expect(sheet.openDemoButton).toBeVisible()
  // Hardly any change from 300 to 320 K, and k up and down by a factor of two: no line bounds Ea from below.
  await rates.paste('T (K)\tk (1/s)\n300\t1e-5\n306\t2e-5\n313\t1e-5\n320\t1.8e-5\n')
  await rates.take()
  await rates.cell('k', 1).fill('7.87 × 107')
  await page.keyboard.press('Enter')
  await expect(page.getByRole('alert')).toContainText('“× 107” may be 10^7 or a hundred and seven')
  await page.keyboard.press('Escape')
  await rates.goTo('Activation energy')
  await expect(page.getByText(/The interval of Ea reaches below 0, .* these rate constants do not bound Ea from below/)).toBeVisible()
})

test('nothing scrolls sideways at 900 by 600 and at twice the size', async ({ sheet, page }) => {
  const rates = new RateConstantSheet(page)
  await expect(sheet.openDemoButton).toBeVisible()
  await rates.paste(n2o5)
  await rates.take()
  for (const [width, height] of [
    [900, 600],
    [720, 450],
  ] as const) {
    await page.setViewportSize({ width, height })
    for (const stage of ['Rate constants', 'Activation energy'] as const) {
      await rates.goTo(stage)
      const overflow = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
      expect(overflow, `${stage} at ${width} by ${height} scrolls sideways`).toBeLessThanOrEqual(0)
      await expect(rates.rail).toBeInViewport()
      if (stage === 'Activation energy') {
        await expect(page.getByText(/^A calculated value is an estimate for planning;/)).toBeInViewport({ ratio: 1 })
      }
    }
  }
})
