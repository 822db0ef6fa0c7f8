'use client'

import { ErrorScreen } from '@/components/shell/error-screen'
import './globals.css'

/** Stands in for the whole page, root layout included, so it brings its own. */
export default function GlobalError(props: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <html lang="en">
      <body>
        <ErrorScreen {...props} />
      </body>
    </html>
  )
}
