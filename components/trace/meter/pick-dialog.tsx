'use client'

import { useState } from 'react'
import { Button } from '../../ui/button'
import { Dialog } from '../../ui/dialog'
import { Field } from '../../ui/field'

export interface PickChoice {
  id: string
  name: string
  about?: string
}

/** A list to pick a point, wire or load from, narrowed by typing. */
export function PickDialog({
  title,
  choices,
  open,
  onPick,
  onClose,
}: {
  title: string
  choices: readonly PickChoice[]
  open: boolean
  onPick: (id: string) => void
  onClose: () => void
}) {
  const [words, setWords] = useState('')
  const wanted = words.toLowerCase().split(/\s+/).filter(Boolean)
  const shown = choices.filter((choice) => {
    const text = `${choice.name} ${choice.about ?? ''} ${choice.id}`.toLowerCase()
    return wanted.every((word) => text.includes(word))
  })
  const close = () => {
    setWords('')
    onClose()
  }
  return (
    <Dialog open={open} onClose={close} title={title}>
      <Field label="Find" value={words} onChange={(event) => setWords(event.target.value)} autoFocus />
      <ul className="mt-3 max-h-[50dvh] overflow-y-auto border-t border-line">
        {shown.map((choice) => (
          <li key={choice.id} className="border-b border-line">
            <Button
              look="text"
              className="w-full justify-start text-left no-underline"
              onClick={() => {
                onPick(choice.id)
                close()
              }}
            >
              <span className="flex-1">{choice.name}</span>
              {choice.about && <span className="text-small font-normal text-ink-2">{choice.about}</span>}
            </Button>
          </li>
        ))}
        {shown.length === 0 && <li className="py-3 text-ink-2">Nothing fits these words.</li>}
      </ul>
    </Dialog>
  )
}
