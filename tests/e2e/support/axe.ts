import AxeBuilder from '@axe-core/playwright'
import { expect, type Page } from '@playwright/test'

/** Text on a phone is read in the sun with gloves on: 7:1 there (WCAG 2.2, 1.4.6), and everything of A and AA everywhere. */
export async function expectAccessible(page: Page, where: string, { enhancedContrast }: { enhancedContrast: boolean }): Promise<void> {
  await page.evaluate(() => Promise.all(document.getAnimations().map(animation => animation.finished.catch(() => {}))))
  const builder = new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
  if (enhancedContrast) builder.options({ rules: { 'color-contrast-enhanced': { enabled: true } } })
  const { violations } = await builder.analyze()
  expect.soft(violations.map(one => `${where}: ${one.id}, ${one.help}: ${one.nodes.map(node => `${node.target.join(' ')} [${node.any.map(check => check.message).join('; ')}]`).join(' | ')}`)).toEqual([])
}
