import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { expect, test } from '../pages/program.ts'

function file(folder: string, name: string, content: string | Uint8Array): string {
  writeFileSync(join(folder, name), content)
  return join(folder, name)
}

test('a file that cannot be understood is refused with its line and the reason, and nothing is lost', async ({ sheet, page, folder }) => {
  await sheet.openDemo()
  await sheet.goTo('Runs')
  const rows = Array.from({ length: 40 }, (_, i) => `${i},${300 + i},${(8 - i / 100).toFixed(3)}`)
  rows[20] = '20,320,oops'
  await sheet.chooseFiles([file(folder, 'broken row.csv', ['Time (min),Temperature (K),Mass (mg)', ...rows].join('\n'))])

  const refused = page.getByRole('alert')
  await expect(refused).toContainText('broken row.csv')
  await expect(refused).toContainText('line 22')
  await expect(refused).toContainText('oops')
  await expect(sheet.runsTable.getByRole('row')).toHaveCount(6)
  await page.getByRole('button', { name: 'Dismiss' }).click()
  await expect(refused).toHaveCount(0)
})

test('of several files the good ones come in and the others are named', async ({ sheet, page, folder }) => {
  const good = [
    'Time (min),Temperature (K),Mass (mg)',
    ...Array.from({ length: 300 }, (_, i) => `${i / 10},${400 + i},${(8 - 4 / (1 + Math.exp((150 - i) / 12))).toFixed(5)}`),
  ]
  await sheet.drop([
    file(folder, 'fine 10 K per min.csv', good.join('\n')),
    file(folder, 'picture.csv', Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13)),
    file(folder, 'empty.csv', ''),
  ])
  const refused = page.getByRole('alert')
  await expect(refused).toContainText('2 files not used')
  await expect(refused).toContainText('picture.csv')
  await expect(refused).toContainText('empty.csv')
  await expect(sheet.runsTable.getByRole('row')).toHaveCount(2)
})

test('one run alone says what is missing instead of giving a number', async ({ sheet, page, folder }) => {
  const rows = Array.from(
    { length: 400 },
    (_, i) => `${(i / 10).toFixed(2)},${400 + i},${(8 - 4 / (1 + Math.exp((200 - i) / 12))).toFixed(5)}`,
  )
  await sheet.chooseFiles([file(folder, 'alone 10 K per min.csv', ['Time (min),Temperature (K),Mass (mg)', ...rows].join('\n'))])
  await expect(page.getByRole('button', { name: /1 stop/ })).toBeVisible()
  await sheet.goTo('Activation energy')
  await expect(page.getByRole('main')).toContainText(/programme/)
})
