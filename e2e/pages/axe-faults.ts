import { AxeBuilder } from '@axe-core/playwright'
import type { Page } from '@playwright/test'

/** Everything axe finds at WCAG 2.2 AA, in a form that a failure can be read from. */
export async function axeFaults(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa']).analyze()
  return violations.flatMap(({ id, help, nodes }) => nodes.map((node) => `${id}: ${help}: ${node.html.slice(0, 160)}`))
}
