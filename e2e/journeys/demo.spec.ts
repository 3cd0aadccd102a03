import { expect, test } from '../pages/program.ts'

const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length

/** Slope of the least-squares line through the points that a chart of straight lines tells, per 1000/T. */
function slopeOf(told: string): number {
  const points = [...told.matchAll(/: 1000\/T (\S+) 1\/K, \S+ (-[\d.]+)/g)].map((match) => [Number(match[1]), Number(match[2])] as const)
  expect(points).toHaveLength(5)
  const [xMean, yMean] = [mean(points.map(([x]) => x)), mean(points.map(([, y]) => y))]
  const sum = (of: (x: number, y: number) => number): number => points.reduce((total, [x, y]) => total + of(x - xMean, y - yMean), 0)
  return sum((x, y) => x * y) / sum((x) => x * x)
}

test('the demo series is one click away and shows both stages', async ({ sheet }) => {
  await sheet.openDemo()
  await expect(sheet.page.getByRole('tab')).toHaveText(['Runs', 'Activation energy'])
  await sheet.goTo('Runs')
  await expect(sheet.runsTable.getByRole('row')).toHaveCount(6)
  await expect(sheet.chart('Signals')).toBeVisible()
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
    const energy = /: Conversion α ([\d.]+), Ea ([\d.]+) kJ/.exec(await sheet.told(/^Activation energy/))
    expect(Number(energy?.[1])).toBe(conversion)
    expect(Number(energy?.[2])).toBeCloseTo(Number(Ea), 0)
    const lines = await sheet.told(/^Straight lines/)
    expect(lines).toContain(`α ${conversion}`)
    // The line at the left must carry the Ea at the right: slope = -1.0008 Ea/R (M. J. Starink, Thermochim. Acta 404 (2003) 163).
    expect(Math.abs((-slopeOf(lines) * 8.31446) / 1.0008 - Number(Ea))).toBeLessThan(1)
    await expect.poll(async () => Buffer.compare(pictureBefore, await sheet.chart(/^Straight lines/).screenshot())).not.toBe(0)
  }
})

test('the minimising method shows Phi with its minimum where the read-out says', async ({ sheet }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  await sheet.chooseMethod('Vyazovkin')
  await expect(sheet.chart(/^Φ/)).toBeVisible()
  const Ea = /Ea ([\d.]+)/.exec((await sheet.readOut.textContent()) ?? '')?.[1]
  expect(Number(Ea)).toBeGreaterThan(100)
  const minimum = /Minimum: Ea ([\d.]+) kJ/.exec(await sheet.told(/^Φ/))?.[1]
  expect(Number(minimum)).toBeCloseTo(Number(Ea), 0)
})

test('a standard is chosen as the basis of a report: worked out, shown with its scope, and left again', async ({ sheet }) => {
  await sheet.openDemo()
  await sheet.goTo('Activation energy')
  const basis = sheet.page.getByRole('toolbar', { name: 'Report basis' }).or(sheet.page.getByRole('group', { name: 'Report basis' }))
  const methods = sheet.page.getByRole('radiogroup', { name: 'Method', exact: true })
  await expect(methods.getByRole('radio', { name: 'ASTM E1641' })).toHaveCount(0)
  await basis.getByRole('button', { name: 'ASTM E1641' }).click()
  await expect(basis.getByRole('button', { name: 'ASTM E1641' })).toHaveAttribute('aria-pressed', 'true')
  await expect(methods.getByRole('radio', { name: 'ASTM E1641' })).toHaveCount(0)
  await expect(methods.getByRole('radio', { checked: true })).toHaveCount(0)
  await expect(sheet.levelTable.getByRole('columnheader', { name: /ASTM E1641/ })).toBeVisible()
  await expect(sheet.levelTable.getByRole('columnheader', { name: /ln A/ })).toBeVisible()
  await expect(sheet.page.getByText(/ASTM E1641 is made for thermogravimetry between 400 and 1300 K/)).toBeVisible()
  await methods.getByRole('radio', { name: 'Starink' }).click()
  await expect(basis.getByRole('button', { name: 'ASTM E1641' })).toHaveAttribute('aria-pressed', 'false')
  await basis.getByRole('button', { name: 'ASTM E1641' }).click()
  await expect(basis.getByRole('button', { name: 'ASTM E1641' })).toHaveAttribute('aria-pressed', 'true')
  await basis.getByRole('button', { name: 'ASTM E1641' }).click()
  await expect(methods.getByRole('radio')).toHaveCount(7)
  await expect(sheet.levelTable.getByRole('columnheader', { name: /ASTM E1641/ })).toHaveCount(0)
})
