import { expect, test } from '../pages/program.ts'

test('the demo series is one click away and shows both stages', async ({ sheet }) => {
  await sheet.openDemo()
  await expect(sheet.page.getByRole('tab')).toHaveText(['Runs', 'Activation energy'])
  await sheet.goTo('Runs')
  await expect(sheet.runsTable.getByRole('row')).toHaveCount(6)
  await expect(sheet.page.getByRole('group', { name: /mass/i })).toBeVisible()
  await sheet.goTo('Activation energy')
  await expect(sheet.levelTable.getByRole('row')).toHaveCount(20)
  await expect(sheet.chart(/^Activation energy/)).toBeVisible()
})

test('the level rail moves chart, lines, row and read-out to one conversion', async ({ sheet }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  for (const conversion of [0.2, 0.85, 0.5]) {
    const pictureBefore = await sheet.chart(/^Straight lines/).screenshot()
    await sheet.dragRailTo(conversion)

    await expect(sheet.rail).toHaveAttribute('aria-valuenow', String(conversion))
    const [alpha, Ea] = await sheet.currentRow.getByRole('cell').or(sheet.currentRow.getByRole('rowheader')).allTextContents()
    expect(Number(alpha)).toBe(conversion)
    await expect(sheet.readOut).toContainText(conversion.toFixed(2))
    await expect(sheet.readOut).toContainText(`Ea ${Ea}`)
    expect(await sheet.told(/^Activation energy/)).toContain(`α ${conversion.toFixed(2)}`)
    expect(await sheet.told(/^Activation energy/)).toContain(`${Ea}`)
    expect(await sheet.told(/^Straight lines/)).toContain(`α ${conversion.toFixed(2)}`)
    await expect.poll(async () => Buffer.compare(pictureBefore, await sheet.chart(/^Straight lines/).screenshot())).not.toBe(0)
  }
})

test('the minimising method shows Phi with its minimum where the read-out says', async ({ sheet }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  await sheet.page.getByRole('radio', { name: 'Vyazovkin', exact: true }).click({ force: true })
  await expect(sheet.chart(/^Φ/)).toBeVisible()
  const Ea = /Ea ([\d.]+)/.exec((await sheet.readOut.textContent()) ?? '')?.[1]
  expect(Number(Ea)).toBeGreaterThan(100)
  expect(await sheet.told(/^Φ/)).toContain(`${Ea}`)
})
