import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { demoSeries } from '../../main/demo/demo-series.ts'
import { csvOfCommandLine } from '../pages/command-line.ts'
import { expect, test } from '../pages/program.ts'

test.use({ permissions: ['clipboard-read', 'clipboard-write'] })

test('the exported table is what the command line writes for the same runs', async ({ sheet, folder }) => {
  const paths = demoSeries().files.map(({ fileName, bytes }) => {
    writeFileSync(join(folder, fileName), bytes)
    return join(folder, fileName)
  })
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  const out = await sheet.downloads(2, () => sheet.page.getByRole('button', { name: 'Export table (CSV)' }).click())
  expect([...out.keys()].sort()).toEqual(['activation.csv', 'activation.csv.txt'])
  // The sheet works out every kind of interval behind the evaluation, and waits for them.
  expect(out.get('activation.csv')).toBe(csvOfCommandLine(paths, ['--uncertainty']))
  expect(out.get('activation.csv.txt')).toContain('estimate for planning')
})

test('the copied table pastes into a spreadsheet with units in its headings', async ({ sheet }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  await sheet.page.getByRole('button', { name: 'Copy table' }).click()
  const rows = (await sheet.page.evaluate(() => navigator.clipboard.readText()))
    .trim()
    .split(/\r?\n/)
    .map((row) => row.split('\t'))
  expect(rows).toHaveLength(20)
  expect(new Set(rows.map((row) => row.length)).size).toBe(1)
  expect(rows[0]?.[1]).toMatch(/^Ea .*kJ\/mol/)
  const shown = await sheet.currentRow.getByRole('cell').first().textContent()
  const row = rows.find((cells) => Number(cells[0]) === 0.5)
  // One digit more than shown.
  expect(row?.[1]).toMatch(/^\d+\.\d\d$/)
  expect(Math.abs(Number(row?.[1]) - Number(shown))).toBeLessThan(0.0551)
})

test('a copy of the study opens again elsewhere with the same numbers', async ({ sheet, page, folder }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  const before = await sheet.levelTable.allTextContents()
  const arrived = page.waitForEvent('download')
  await page.keyboard.press('Control+s')
  const copy = await arrived
  expect(copy.suggestedFilename()).toMatch(/\.rampfold$/)
  const path = join(folder, copy.suggestedFilename())
  await copy.saveAs(path)

  await page.getByRole('button', { name: 'Study' }).click()
  await page.getByRole('menuitem', { name: 'New study' }).click()
  await expect(sheet.openDemoButton).toBeVisible()
  await sheet.chooseFiles([path])
  await sheet.settled()
  await sheet.goTo('Activation energy')
  expect(await sheet.levelTable.allTextContents()).toEqual(before)
})
