'use client'

import type { Caution } from '@/diagrams/document/circuit-schema'
import { Button } from '../ui/button'
import { Dialog } from '../ui/dialog'
import { Triangle } from '../ui/glyphs'
import { cautionWords, makerFirst, meterRules } from './caution-words'

/** The cautions of a circuit: they must be answered before its first reading and stay at hand afterwards. */
export function CautionsDialog({
  cautions,
  answered,
  open,
  onAnswer,
  onClose,
}: {
  cautions: readonly Caution[]
  answered: boolean
  open: boolean
  onAnswer: () => void
  onClose: () => void
}) {
  return (
    <Dialog
      open={open}
      onClose={onClose}
      title="Before the first reading"
      closeLabel={answered ? 'Close' : 'Not yet'}
      actions={
        answered ? null : (
          <Button look="filled" size="bay" onClick={onAnswer}>
            This is done and held to
          </Button>
        )
      }
    >
      <ul className="grid gap-3">
        {cautions.map((caution) => (
          <li key={caution} className="flex gap-3 border-area border-ink bg-window p-3">
            <Triangle size={28} />
            <span>{cautionWords[caution].says}</span>
          </li>
        ))}
      </ul>
      <p className="mt-3 text-dense text-ink-2">
        {meterRules} {makerFirst}
      </p>
    </Dialog>
  )
}

/** What the cautions fold to. */
export function CautionPlate({
  cautions,
  answered,
  onOpen,
}: {
  cautions: readonly Caution[]
  answered: boolean
  onOpen: () => void
}) {
  if (cautions.length === 0) return null
  return (
    <Button onClick={onOpen} className="pointer-events-auto border-area border-ink">
      <Triangle size={18} />
      {answered ? cautions.map((caution) => cautionWords[caution].name).join(', ') : 'Answer the cautions'}
    </Button>
  )
}
