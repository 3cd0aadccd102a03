import { expect, test } from '../pages/program.ts'

test('a reloaded page shows the study as it was, undo included', async ({ sheet, page }) => {
  await sheet.openDemo()
  await sheet.goTo('Runs')
  await page.getByRole('checkbox', { name: /^Use/ }).first().focus()
  await page.keyboard.press('Space')
  await expect(page.getByRole('checkbox', { name: /^Use/ }).first()).not.toBeChecked()
  await sheet.settled()
  await page.reload()
  await sheet.settled()
  await sheet.goTo('Runs')
  await expect(page.getByRole('checkbox', { name: /^Use/ }).first()).not.toBeChecked()
  await page.getByRole('button', { name: /^Undo: leaving out/ }).click()
  await expect(page.getByRole('checkbox', { name: /^Use/ }).first()).toBeChecked()
})

test('a second tab follows the first', async ({ sheet, page, context, program }) => {
  await sheet.openDemo()
  const second = await context.newPage()
  await second.goto(program.address)
  await expect(second.getByRole('slider', { name: 'Conversion level' })).toBeVisible()
  await second.getByRole('textbox', { name: 'Name of the study' }).fill('Named in the second tab')
  await second.keyboard.press('Enter')
  await expect(page.getByRole('textbox', { name: 'Name of the study' })).toHaveValue('Named in the second tab')
})

test('a restarted program shows the study as it was', async ({ sheet, page, program }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  const before = await sheet.levelTable.allTextContents()
  await page.goto('about:blank')
  await sheet.open(await program.restart())
  await sheet.settled()
  await sheet.goTo('Activation energy')
  expect(await sheet.levelTable.allTextContents()).toEqual(before)
})

test('everything done is undone and done again by the keyboard', async ({ sheet, page }) => {
  await sheet.openDemo()
  await page.keyboard.press('Control+z')
  await expect(sheet.openDemoButton).toBeVisible()
  await page.keyboard.press('Control+Shift+z')
  await sheet.settled()
  await sheet.goTo('Runs')
  await expect(sheet.runsTable.getByRole('row')).toHaveCount(6)
})
