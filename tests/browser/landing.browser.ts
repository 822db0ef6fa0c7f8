import { describe, expect, it } from 'vitest'
import { widths, type WidthName } from './support/widths'
import { withBrowser } from './support/with-browser'

describe('the product as a stranger meets it', () => {
  const test = withBrowser()

  it.each(Object.keys(widths) as WidthName[])(
    'opens on the landing page without scrolling sideways on a %s',
    async (width) => {
      const { page, context } = await test.visit({ width })
      const failures: string[] = []
      page.on('pageerror', (error) => failures.push(error.message))
      page.on(
        'response',
        (response) => response.status() >= 400 && failures.push(`${response.status()} ${response.url()}`),
      )
      const outside: string[] = []
      page.on('request', (request) => {
        if (!request.url().startsWith(test.product.url) && !/^(data|blob):/.test(request.url()))
          outside.push(request.url())
      })
      const answer = await page.goto('/', { waitUntil: 'networkidle' })
      expect(answer?.status()).toBe(200)
      expect(await page.title()).toContain('Halfsplit')
      const { scrolls, shows } = await page.evaluate(() => ({
        scrolls: document.documentElement.scrollWidth,
        shows: document.documentElement.clientWidth,
      }))
      expect(scrolls).toBeLessThanOrEqual(shows)
      expect({ failures, outside }).toEqual({ failures: [], outside: [] })
      await context.close()
    },
  )

  it('sends a stranger from the workspace to the sign-in page', async () => {
    const { page, context } = await test.visit()
    await page.goto('/circuits')
    // The page may be on its way already when it finds nobody signed in.
    await page.waitForURL((url) => url.pathname === '/sign-in')
    expect(await page.getByRole('button', { name: 'Sign in', exact: true }).isVisible()).toBe(true)
    await context.close()
  })
})
