'use client'

import Link from 'next/link'
import type { ReactNode } from 'react'
import { classNames } from '../ui/class-names'
import { Chevron } from '../ui/glyphs'
import { Plate } from '../ui/plate'
import { Mark, Wordmark } from '../ui/wordmark'
import { useActor } from './actor-context'
import { ShopMenu } from './shop-menu'

const places = [{ id: 'circuits', label: 'Circuits', href: '/circuits' }] as const
export type PlaceId = (typeof places)[number]['id']

export interface HeadCircuit {
  title: string
  vehicle: string
  /** As on the plate: "B1042-13". */
  code?: string | null
}

/**
 * The running head: mark, places, and, with a circuit open, its name over the vehicle and the code on a plate; at
 * the right what is saved and the modes. On a tablet the way back takes the places' room, on a phone the modes
 * take a row of their own.
 */
export function RunningHead({
  place = 'circuits',
  circuit,
  saved,
  modes,
  actions,
}: {
  place?: PlaceId
  circuit?: HeadCircuit
  /** "Saved 14:02", "Saving", an offline plate; words, never a sign alone. */
  saved?: ReactNode
  /** A `ModeSwitch`. */
  modes?: ReactNode
  /** Buttons of the place itself. */
  actions?: ReactNode
}) {
  const actor = useActor()
  return (
    <header className="double-rule z-head bg-panel">
      <div className="flex min-h-[3.75rem] laptop:min-h-[3.25rem] items-center gap-x-3 laptop:gap-x-5 px-3 tablet:px-5">
        {circuit ? (
          <>
            <Link
              href="/circuits"
              aria-label="Back to Circuits"
              className="laptop:hidden -ml-2 flex min-h-target min-w-target items-center justify-center gap-2 tablet:pr-1"
            >
              <Chevron direction="left" size={22} />
              <Mark className="hidden tablet:block" />
            </Link>
            <Link href="/circuits" className="hidden laptop:flex min-h-target items-center no-underline">
              <Wordmark />
            </Link>
          </>
        ) : (
          <Link
            href="/circuits"
            aria-label="Halfsplit"
            className="-ml-1.5 flex min-h-target min-w-target items-center justify-center no-underline tablet:ml-0"
          >
            <Mark size={30} className="tablet:hidden" />
            <Wordmark className="hidden! tablet:inline-flex!" />
          </Link>
        )}
        <nav
          aria-label="Places"
          className={classNames('h-[3.75rem] laptop:h-[3.25rem]', circuit ? 'hidden laptop:flex' : 'flex')}
        >
          {places.map((entry) => (
            <Link
              key={entry.id}
              href={entry.href}
              aria-current={place === entry.id ? (circuit ? 'true' : 'page') : undefined}
              className={classNames(
                'flex items-center px-1 text-body tablet:text-[1.0625rem] no-underline',
                // The bar of the place one is in lies on the rule below.
                place === entry.id
                  ? 'font-bold text-ink shadow-[inset_0_-5px_0_var(--ink)]'
                  : 'text-ink-2 hover:shadow-[inset_0_-3px_0_var(--edge)]',
              )}
            >
              {entry.label}
            </Link>
          ))}
        </nav>
        {circuit && (
          <div className="flex min-w-0 flex-1 items-center gap-3 laptop:border-l-2 laptop:border-edge laptop:pl-4">
            <div className="min-w-0">
              <h1 className="truncate text-body tablet:text-[1.0625rem] leading-tight font-bold">
                {circuit.title}
              </h1>
              {circuit.vehicle && (
                <p className="hidden tablet:block truncate text-small leading-tight text-ink-2">
                  {circuit.vehicle}
                </p>
              )}
            </div>
            {circuit.code && (
              <Plate className="ml-auto tablet:ml-0 text-dense tablet:text-body">{circuit.code}</Plate>
            )}
          </div>
        )}
        <div className="ml-auto flex items-center gap-3">
          {saved && <div className="hidden tablet:block text-small text-ink-2">{saved}</div>}
          {modes && <div className="hidden tablet:block">{modes}</div>}
          {actions && <div className="hidden tablet:flex items-center gap-2">{actions}</div>}
          {actor && (
            <div className={classNames(circuit && 'hidden laptop:block')}>
              <ShopMenu actor={actor} />
            </div>
          )}
        </div>
      </div>
      {(modes || saved || actions) && (
        <div className="tablet:hidden flex flex-wrap items-center gap-2 px-3 pb-2">
          {modes && <div className="w-full">{modes}</div>}
          {actions}
          {saved && <div className="text-small text-ink-2">{saved}</div>}
        </div>
      )}
    </header>
  )
}
