'use client'

import { useEffect, useId, useRef, useState } from 'react'
import type { Role } from '@/lib/shared/permissions'
import { Button } from '../ui/button'
import { classNames } from '../ui/class-names'
import { Chevron } from '../ui/glyphs'
import type { ActorView } from './actor-context'
import { OrganisationSwitch } from './organisation-switch'
import { SignOut } from './sign-out'
import { ThemeSwitch } from './theme-switch'

export const roleWords: Record<Role, string> = {
  owner: 'Owner',
  instructor: 'Instructor',
  technician: 'Technician',
  student: 'Student',
}

/** The shop's name; it opens who is signed in, the other shops, light or dark, and the way out. */
export function ShopMenu({ actor }: { actor: ActorView }) {
  const [open, setOpen] = useState(false)
  const box = useRef<HTMLDivElement>(null)
  const opener = useRef<HTMLButtonElement>(null)
  const panelId = useId()

  useEffect(() => {
    if (!open) return
    const onPointer = (event: PointerEvent) => {
      if (!box.current?.contains(event.target as Node)) setOpen(false)
    }
    const onKey = (event: KeyboardEvent) => {
      if (event.key !== 'Escape') return
      setOpen(false)
      opener.current?.focus()
    }
    document.addEventListener('pointerdown', onPointer)
    document.addEventListener('keydown', onKey)
    return () => {
      document.removeEventListener('pointerdown', onPointer)
      document.removeEventListener('keydown', onKey)
    }
  }, [open])

  return (
    <div ref={box} className="relative">
      <Button
        ref={opener}
        aria-expanded={open}
        aria-controls={panelId}
        onClick={() => setOpen(!open)}
        className="max-w-44 tablet:max-w-60"
      >
        <span className="truncate">{actor.organisation.name}</span>
        <Chevron direction={open ? 'up' : 'down'} size={14} />
      </Button>
      <div
        id={panelId}
        hidden={!open}
        className={classNames(
          'absolute right-0 top-full mt-2 w-[min(22rem,calc(100vw-1.5rem))] z-menu',
          'rounded-field border-area border-ink bg-panel p-4 shadow-menu',
        )}
      >
        <p className="text-lead">{actor.name}</p>
        <p className="mt-0.5 text-small text-ink-2">
          {roleWords[actor.role]} at {actor.organisation.name}
        </p>
        <p className="text-small text-ink-2 break-all">{actor.email}</p>
        <OrganisationSwitch actor={actor} />
        <div className="mt-4 border-t border-line pt-4">
          <ThemeSwitch fill />
        </div>
        <div className="mt-4 border-t border-line pt-4">
          <SignOut />
        </div>
      </div>
    </div>
  )
}
