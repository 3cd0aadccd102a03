import { existsSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { expect, root, test } from '../pages/program.ts'
import { csvOfCommandLine } from '../pages/command-line.ts'

const folder = join(root, '../shared/data/measured/pine-tga-dsc-n2-three-rates')
const present = existsSync(folder)
const files = present
  ? readdirSync(folder)
      .filter((name) => name.endsWith('.csv'))
      .map((name) => join(folder, name))
  : []

test.describe('measured exports, as the instruments wrote them', () => {
  test.skip(!present, 'the open data sets do not lie beside this checkout')

  test('are dropped, read, judged and exported like the command line does', async ({ sheet }) => {
    await sheet.drop(files)
    await sheet.settled()
    await sheet.goTo('Runs')
    await expect(sheet.runsTable.getByRole('row')).toHaveCount(files.length + 1)
    await expect(sheet.page.getByRole('button', { name: /caution/ })).toBeVisible()
    await expect(sheet.page.getByRole('complementary')).toContainText(/nominal/i)
    // Both signals are offered; mass is taken first, and a note says so.
    await expect(sheet.page.getByRole('radio', { name: 'Mass' })).toBeChecked()

    await sheet.goTo('Activation energy')
    const out = await sheet.downloads(2, () => sheet.page.getByRole('button', { name: 'Export table (CSV)' }).click())
    expect(out.get('activation.csv')).toBe(csvOfCommandLine(files, ['--uncertainty']))
  })
})
