import { readFileSync } from 'node:fs'
import { basename } from 'node:path'
import { type Download, expect, type Locator, type Page } from '@playwright/test'

export type StageName = 'Runs' | 'Activation energy'

/** The sheet as a person meets it: by role and by name. */
export class Sheet {
  readonly page: Page

  constructor(page: Page) {
    this.page = page
  }

  async open(address: string): Promise<void> {
    await this.page.goto(address)
    await expect(this.page.getByRole('heading', { level: 1, name: 'Rampfold' })).toBeVisible()
  }

  get openDemoButton(): Locator {
    return this.page.getByRole('button', { name: 'Open the demo series' })
  }

  async openDemo(): Promise<void> {
    await this.openDemoButton.click()
    await this.settled()
  }

  /** Until results stand and none are on their way. */
  async settled(): Promise<void> {
    await expect(this.rail).toBeVisible()
    await expect(this.page.getByRole('main')).toHaveAttribute('aria-busy', 'false')
  }

  async goTo(stage: StageName): Promise<void> {
    await this.page.getByRole('tab', { name: stage }).click()
    await expect(this.page.getByRole('tab', { name: stage })).toHaveAttribute('aria-selected', 'true')
  }

  get rail(): Locator {
    return this.page.getByRole('slider', { name: 'Conversion level' })
  }

  get runsTable(): Locator {
    return this.page.getByRole('table', { name: /^Runs of the study/ })
  }

  get levelTable(): Locator {
    return this.page.getByRole('table', { name: 'Activation energy at every level of conversion' })
  }

  async chooseMethod(label: string): Promise<void> {
    await this.page.getByRole('radiogroup', { name: 'Method' }).getByText(label, { exact: true }).click()
  }

  /** One of a few options in sight, by the label of the choice and the option's text. */
  option(choice: string, text: string): Locator {
    return this.page.getByRole('radiogroup', { name: choice, exact: true }).getByRole('radio', { name: text, exact: true })
  }

  get budgetTable(): Locator {
    return this.page.getByRole('table', { name: /^Where the uncertainty comes from/ })
  }

  /** A line of the budget, by its source. */
  budgetRow(source: string): Locator {
    return this.budgetTable.getByRole('row').filter({ has: this.page.getByRole('rowheader', { name: source, exact: true }) })
  }

  get peakTable(): Locator {
    return this.page.getByRole('table', { name: /^Activation energy from rate peaks/ })
  }

  get currentRow(): Locator {
    return this.levelTable.locator('tr[aria-current="true"]')
  }

  /** The foot of the sheet: what the chosen method says at the level. */
  get readOut(): Locator {
    return this.page.getByRole('contentinfo', { name: 'Level rail' })
  }

  /** A chart, by its title. */
  chart(title: string | RegExp): Locator {
    return this.page.getByRole('figure', { name: title })
  }

  /** What stands out in a chart at the current level, as it tells people who hear the screen. */
  async told(title: string | RegExp): Promise<string> {
    return (await this.chart(title).locator('..').getByRole('note').textContent()) ?? ''
  }

  /** Drags the rail's handle to a conversion, as a hand does: down, a few moves, up. */
  async dragRailTo(conversion: number): Promise<void> {
    const box = await this.rail.boundingBox()
    if (box === null) throw new Error('The level rail is not on the screen.')
    const y = box.y + box.height / 2
    const now = Number(await this.rail.getAttribute('aria-valuenow'))
    const at = (alpha: number): number => box.x + alpha * box.width
    await this.page.mouse.move(at(now), y)
    await this.page.mouse.down()
    for (const share of [0.25, 0.5, 0.75, 1]) await this.page.mouse.move(at(now + share * (conversion - now)), y)
    await this.page.mouse.up()
  }

  /** Drops files on the window, as from a folder. */
  async drop(paths: readonly string[]): Promise<void> {
    const files = paths.map((path) => ({ name: basename(path), base64: readFileSync(path).toString('base64') }))
    const transfer = await this.page.evaluateHandle((all) => {
      const data = new DataTransfer()
      for (const { name, base64 } of all) {
        const bytes = Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0))
        data.items.add(new File([bytes], name))
      }
      return data
    }, files)
    const target = this.page.getByRole('main')
    for (const type of ['dragenter', 'dragover', 'drop']) await target.dispatchEvent(type, { dataTransfer: transfer })
  }

  async chooseFiles(paths: readonly string[]): Promise<void> {
    await this.page.getByLabel('Files to open').setInputFiles([...paths])
  }

  /** The files a click downloads, by name. */
  async downloads(count: number, act: () => Promise<void>): Promise<ReadonlyMap<string, string>> {
    const arrived: Download[] = []
    this.page.on('download', (download) => arrived.push(download))
    await act()
    await expect.poll(() => arrived.length).toBe(count)
    return new Map(
      await Promise.all(arrived.map(async (one) => [one.suggestedFilename(), readFileSync(await one.path(), 'utf8')] as const)),
    )
  }
}
