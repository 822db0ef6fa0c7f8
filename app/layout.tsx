import type { Metadata, Viewport } from 'next'
import type { ReactNode } from 'react'
import { fontVariables } from '@/components/shell/fonts'
import { Providers } from '@/components/shell/providers'
import { themeScript } from '@/components/shell/theme'
import './globals.css'

export const metadata: Metadata = {
  title: { default: 'Halfsplit', template: '%s · Halfsplit' },
  description: 'Draw the circuit. Take a reading. Split what is left.',
  icons: { icon: { url: '/mark.svg', type: 'image/svg+xml' } },
}

export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: [
    { media: '(prefers-color-scheme: light)', color: '#f0f4f0' },
    { media: '(prefers-color-scheme: dark)', color: '#1e2628' },
  ],
}

export default function RootLayout({ children }: { children: ReactNode }) {
  return (
    // The script below sets data-theme before React looks at the element.
    <html lang="en" className={fontVariables} suppressHydrationWarning>
      <head>
        <script dangerouslySetInnerHTML={{ __html: themeScript }} />
      </head>
      <body>
        <Providers>{children}</Providers>
      </body>
    </html>
  )
}
