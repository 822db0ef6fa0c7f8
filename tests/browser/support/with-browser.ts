import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core'
import { afterAll, beforeAll } from 'vitest'
import { type Product, startProduct } from './product'
import { type Scheme, type WidthName, widths } from './widths'

/** Debian's Chromium; as root it has no sandbox to stand in, and nothing here may speak to the outside. */
const args = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

export type Visit = { page: Page; context: BrowserContext }
export type VisitOptions = { width?: WidthName; scheme?: Scheme; touch?: boolean }

export type BrowserTest = {
  readonly product: Product
  /** A new person at a new device: no cookie, no storage. Closed with the file. */
  visit: (options?: VisitOptions) => Promise<Visit>
}

/** Gives this test file the running product and a browser: `const { visit } = withBrowser()` at its top. */
export function withBrowser(): BrowserTest {
  let product: Product | undefined
  let browser: Browser | undefined

  beforeAll(async () => {
    product = await startProduct()
    browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args })
  })

  afterAll(async () => {
    await browser?.close()
    await product?.stop()
  })

  return {
    get product() {
      if (!product) throw new Error('The product runs inside tests and hooks only.')
      return product
    },
    visit: async ({ width = 'laptop', scheme = 'light', touch = width !== 'laptop' } = {}) => {
      if (!browser || !product) throw new Error('The browser runs inside tests and hooks only.')
      const context = await browser.newContext({
        baseURL: product.url,
        viewport: widths[width],
        colorScheme: scheme,
        hasTouch: touch,
        reducedMotion: 'reduce',
        acceptDownloads: true,
      })
      context.setDefaultTimeout(15_000)
      return { context, page: await context.newPage() }
    },
  }
}
