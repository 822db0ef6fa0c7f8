'use client'

import { keepPreviousData, useInfiniteQuery, useQuery } from '@tanstack/react-query'
import { useEffect, useRef, useState } from 'react'
import { allOpenTracesQuery, circuitsQuery } from '@/lib/client/api/circuits'
import type { CircuitPage } from '@/lib/shared/api/circuits'
import { Band } from '../ui/band'
import { Button, ButtonLink } from '../ui/button'
import { classNames } from '../ui/class-names'
import { RuledLines } from '../ui/ruled-lines'
import { useOnline } from '../ui/use-online'
import { CircuitRows } from './circuit-rows'
import { EmptySheet } from './empty-sheet'
import { FinderRow } from './finder-row'
import { anyFinder, type Finders, findersQuery, findersWords, noFinders } from './finders'
import { captionWords, countWords } from './found-words'
import { OpenTraces } from './open-traces'
import { PhoneFinder } from './phone-finder'
import { ThumbIndex, ThumbRow, ThumbSheet } from './thumb-index'
import { useSettled } from './use-settled'

/** Circuits: finders, result rows, thumb index by system, traces left open. */
export function CircuitsScreen({
  initialFinders,
  initialPage,
  mayCreate,
}: {
  initialFinders: Finders
  initialPage: CircuitPage | null
  mayCreate: boolean
}) {
  const [finders, setFinders] = useState(initialFinders)
  const query = useSettled(findersQuery(finders), 250)
  const online = useOnline()
  const nameField = useRef<HTMLInputElement>(null)
  const found = useInfiniteQuery({
    ...circuitsQuery(query),
    placeholderData: keepPreviousData,
    initialData:
      initialPage && query === findersQuery(initialFinders)
        ? { pages: [initialPage], pageParams: [null] }
        : undefined,
  })
  const traces = useQuery(allOpenTracesQuery())

  // The address follows the finders, so that a search can be sent to someone and the way back finds it again.
  useEffect(() => {
    history.replaceState(history.state, '', query === '' ? '/circuits' : `/circuits?${query}`)
  }, [query])

  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      const target = event.target as HTMLElement
      if (event.key !== '/' || event.ctrlKey || event.metaKey || event.altKey) return
      if (target.closest('input, textarea, select, [contenteditable]')) return
      event.preventDefault()
      nameField.current?.focus()
    }
    document.addEventListener('keydown', onKey)
    return () => document.removeEventListener('keydown', onKey)
  }, [])

  const first = found.data?.pages[0]
  const rows = found.data?.pages.flatMap((page) => page.rows) ?? []
  const clear = () => setFinders({ ...noFinders, system: finders.system })
  const index = {
    systems: first?.systems ?? [],
    circuits: first?.circuits ?? 0,
    picked: finders.system,
    onPick: (system: string) => setFinders({ ...finders, system }),
  }
  const noneAtAll = first !== undefined && first.circuits === 0

  return (
    <main
      className={classNames(
        'flex flex-1 flex-col',
        !noneAtAll && 'laptop:grid laptop:grid-cols-[minmax(0,1fr)_11rem]',
      )}
    >
      <div className="flex min-w-0 flex-1 flex-col">
        {!noneAtAll && (
          <section aria-label="Finders" className="bg-tray border-b-2 border-ink px-4 tablet:px-5 py-4">
            <FinderRow finders={finders} onChange={setFinders} onClear={clear} nameRef={nameField} />
            <PhoneFinder finders={finders} onChange={setFinders} onClear={clear} />
            <ThumbRow {...index} />
            <ThumbSheet {...index} />
          </section>
        )}
        {!online && (
          <Band kind="note" title="Offline" className="m-3">
            {rows.length > 0
              ? 'The rows below were read before the network went; they may be older than the shop has now.'
              : 'Circuits are read again as soon as there is a network.'}
          </Band>
        )}
        {found.error && online && (
          <Band
            title="The circuits could not be read."
            className="m-3"
            actions={<Button onClick={() => found.refetch()}>Try again</Button>}
          >
            {found.error.message}
          </Band>
        )}
        {noneAtAll ? (
          <EmptySheet title="No circuits yet.">
            {mayCreate ? (
              <ButtonLink href="/circuits/import" look="filled" size="bay">
                Bring one in
              </ButtonLink>
            ) : (
              <p className="text-ink-2">Whoever runs the shop's library brings them in.</p>
            )}
          </EmptySheet>
        ) : (
          <section
            aria-label="Circuits found"
            aria-busy={found.isFetching}
            className="flex-1 bg-sheet px-4 tablet:px-5 pt-4 pb-5"
          >
            {first ? (
              <>
                <p role="status" className={classNames(found.isPlaceholderData && 'text-ink-3')}>
                  <span className="text-lead">{countWords(first, rows)}</span>
                  <span className="ml-3 text-body text-ink-2">
                    {found.isPlaceholderData
                      ? `${online ? 'Looking for' : 'Waiting for the network to look for'} ${findersWords(finders) || 'all circuits'}`
                      : captionWords(first, rows, finders)}
                  </span>
                </p>
                {rows.length > 0 ? (
                  <div className="mt-2">
                    <CircuitRows rows={rows} />
                  </div>
                ) : (
                  <div className="py-8">
                    <p className="text-body text-ink-2">
                      No circuit here has all of that. Take a finder away, or look in all systems.
                    </p>
                    <div className="mt-4 flex flex-wrap gap-2">
                      {anyFinder(finders) && <Button onClick={clear}>Clear the finders</Button>}
                      {finders.system !== '' && (
                        <Button onClick={() => index.onPick('')}>Look in all systems</Button>
                      )}
                    </div>
                  </div>
                )}
                {found.hasNextPage && (
                  <div className="mt-4 flex items-center gap-4">
                    <Button
                      size="bay"
                      disabled={found.isFetchingNextPage}
                      onClick={() => found.fetchNextPage()}
                    >
                      {found.isFetchingNextPage ? 'Reading more' : 'Show more'}
                    </Button>
                    <span className="text-body text-ink-2">
                      {rows.length} of {first.found.rows} shown
                    </span>
                  </div>
                )}
              </>
            ) : (
              !found.error && <RuledLines rows={6} label="Reading the circuits" />
            )}
          </section>
        )}
        {traces.data && <OpenTraces rows={traces.data.rows} />}
      </div>
      {!noneAtAll && (
        <div className="hidden laptop:block border-l border-edge bg-tray">
          <ThumbIndex {...index} />
        </div>
      )}
    </main>
  )
}
