import type { Page } from 'playwright-core'

/** What the keyboard is on, as a screen reader would name it. */
export const focused = (page: Page) => page.evaluate(() => {
  const at = document.activeElement
  // Nothing has the focus, or the page as a whole: their text is everybody's.
  if (!(at instanceof HTMLElement) || at.tabIndex < 0) return ''
  const group = at.closest('fieldset')?.querySelector('legend')?.textContent?.trim() ?? ''
  const labels = at instanceof HTMLInputElement ? [...at.labels ?? []].map(label => label.textContent?.trim() ?? '') : []
  return [group, at.getAttribute('aria-label') ?? labels.join(' '), at instanceof HTMLInputElement ? '' : at.innerText].filter(Boolean).join(' / ')
})

/** Goes on by Tab until what is wanted has the focus. */
export async function tabTo(page: Page, wanted: RegExp, most = 120): Promise<void> {
  for (let step = 0; step < most; step++) {
    if (wanted.test(await focused(page))) return
    await page.keyboard.press('Tab')
  }
  throw new Error(`Tab never came to ${wanted.source}`)
}
