import { expect, type Locator, type Page } from '@playwright/test'

/** The sheet of a study that holds rate constants against temperature, as a person meets it. */
export class RateConstantSheet {
  readonly page: Page

  constructor(page: Page) {
    this.page = page
  }

  /** Ctrl+V with a text on the clipboard, wherever the focus is. */
  async paste(text: string): Promise<void> {
    await this.page.evaluate((pasted) => {
      const clipboardData = new DataTransfer()
      clipboardData.setData('text/plain', pasted)
      const target = document.activeElement ?? document.body
      target.dispatchEvent(new ClipboardEvent('paste', { clipboardData, bubbles: true, cancelable: true }))
    }, text)
  }

  async take(): Promise<void> {
    await this.page.getByRole('button', { name: 'Use this table' }).click()
    await this.settled()
  }

  async settled(): Promise<void> {
    await expect(this.rail).toBeVisible()
    await expect(this.page.getByRole('main')).toHaveAttribute('aria-busy', 'false')
  }

  async goTo(stage: 'Rate constants' | 'Activation energy'): Promise<void> {
    await this.page.getByRole('tab', { name: stage }).click()
    await expect(this.page.getByRole('tab', { name: stage })).toHaveAttribute('aria-selected', 'true')
  }

  get rail(): Locator {
    return this.page.getByRole('slider', { name: 'Temperature of the table' })
  }

  get readOut(): Locator {
    return this.page.getByRole('contentinfo', { name: 'Temperature rail' })
  }

  /** A cell of the table as typed; the row that waits is `new`. */
  cell(column: 'Temperature' | 'k' | 'u(k)' | 'Label', row: number | 'new'): Locator {
    return this.page.getByRole('textbox', { name: `${column}, ${row === 'new' ? 'new row' : `row ${row}`}`, exact: true })
  }

  get lineTable(): Locator {
    return this.page.getByRole('table', { name: 'Rate constants, the line, and how far they lie from it' })
  }

  /** What stands in the row of a quantity: value, standard error, ends. */
  async parameter(quantity: string): Promise<readonly string[]> {
    const table = this.page.getByRole('table', { name: 'Parameters of the Arrhenius line' })
    const row = table.getByRole('row').filter({ has: this.page.getByRole('rowheader', { name: quantity, exact: true }) })
    return row.getByRole('cell').allTextContents()
  }

  /** The row of a reaction model in the ranking. */
  model(code: string): Locator {
    const table = this.page.getByRole('table', { name: 'Reaction models, the closest to the holds first' })
    return table.getByRole('row').filter({ has: this.page.getByText(code, { exact: true }) })
  }

  get holdTable(): Locator {
    return this.page.getByRole('table', { name: /^How .* follows the holds$/ })
  }

  get predictions(): Locator {
    return this.page.getByRole('table', { name: 'Predicted rate constants' })
  }

  async predictAt(text: string): Promise<void> {
    const field = this.page.getByLabel('Predict k at')
    await field.fill(text)
    await field.press('Enter')
    await this.settled()
  }
}
