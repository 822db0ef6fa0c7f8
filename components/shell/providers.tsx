'use client'

import { MutationCache, QueryCache, QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { type ReactNode, useState } from 'react'
import { CallError } from '@/lib/client/api/traces'
import { reportSessionEnded } from './session-ended'

const onError = (error: unknown) => {
  if (error instanceof CallError && error.failure.code === 'not-signed-in') reportSessionEnded()
}

export function Providers({ children }: { children: ReactNode }) {
  const [client] = useState(
    () =>
      new QueryClient({
        queryCache: new QueryCache({ onError }),
        mutationCache: new MutationCache({ onError }),
        defaultOptions: {
          queries: {
            staleTime: 15_000,
            // A refusal stays a refusal; only a server that does not answer is worth asking again.
            retry: (failures, error) => error instanceof CallError && error.failure.tryAgain && failures < 2,
          },
        },
      }),
  )
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>
}
