import { mkdirSync } from 'node:fs'
import path from 'node:path'
import type { Page } from 'playwright-core'
import { dataFolder } from '../../../scripts/steps/project-folder.mjs'
import { schemes, type WidthName, widths } from './widths'

/** Where pictures for people to look at go. */
export const pictureFolder = path.join(dataFolder, 'pictures')

/** Pictures of what the page shows now, at every width in both themes: `<name>-<width>-<theme>.png`. */
export async function takePictures(page: Page, name: string): Promise<string[]> {
  mkdirSync(pictureFolder, { recursive: true })
  const before = page.viewportSize()
  const taken: string[] = []
  await page.evaluate(() => document.fonts.ready.then(() => undefined))
  for (const width of Object.keys(widths) as WidthName[]) {
    await page.setViewportSize(widths[width])
    for (const scheme of schemes) {
      await page.emulateMedia({ colorScheme: scheme })
      // Two frames: one for the new size, one for what follows from it.
      await page.evaluate(
        () => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(() => done(null)))),
      )
      const file = path.join(pictureFolder, `${name}-${widths[width].width}-${scheme}.png`)
      await page.screenshot({ path: file })
      taken.push(file)
    }
  }
  await page.emulateMedia({ colorScheme: 'light' })
  if (before) await page.setViewportSize(before)
  return taken
}
