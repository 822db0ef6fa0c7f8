import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { CircuitsHead } from '@/components/circuits/circuits-head'
import { CircuitsScreen } from '@/components/circuits/circuits-screen'
import { findersQuery, readFinders } from '@/components/circuits/finders'
import { attempt } from '@/lib/server/http/attempt'
import { currentContext } from '@/lib/server/http/session'
import { searchCircuits } from '@/lib/server/use-cases/circuits/search-circuits'
import { can } from '@/lib/shared/permissions'

export const metadata: Metadata = { title: 'Circuits' }

export default async function CircuitsPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>
}) {
  const context = await currentContext()
  if (!context) redirect('/sign-in?ended=1&to=/circuits')
  const asked = await searchParams
  const finders = readFinders({ get: (name) => [asked[name]].flat()[0] ?? null })
  // A search that fails is asked again by the screen, which can say what is wrong and offer to try again.
  const found = await attempt(() =>
    searchCircuits(context, Object.fromEntries(new URLSearchParams(findersQuery(finders)))),
  )
  const mayCreate = can(context.actor.role, 'circuit.create')
  return (
    <>
      <CircuitsHead mayCreate={mayCreate} />
      <CircuitsScreen
        initialFinders={finders}
        initialPage={found.ok ? found.value : null}
        mayCreate={mayCreate}
      />
    </>
  )
}
