'use client'

import { useState } from 'react'
import type { ConnectorChoice } from '@/lib/shared/api/circuits'
import { errors } from '@/lib/shared/errors'
import type { Failure } from '@/lib/shared/result'
import { Button } from '../ui/button'
import { Choice } from '../ui/choice'
import { Triangle } from '../ui/glyphs'

const choices = [
  { value: 'keep', label: "Keep the vehicle's" },
  { value: 'replace', label: "Take the document's" },
] as const

const consequences = {
  keep: 'The circuit comes in and uses the connectors the vehicle already has. Other circuits stay as they are.',
  replace:
    "The circuit comes in and its connectors become the vehicle's. Every other circuit of the vehicle shows them, too.",
} as const

/** A vehicle owns its connectors: where the document's differ, one of the two must give way, and someone decides. */
export function ConnectorDifference({
  failure,
  sending,
  onChoose,
}: {
  failure: Failure
  sending: boolean
  onChoose: (choice: ConnectorChoice) => void
}) {
  const [choice, setChoice] = useState<'keep' | 'replace' | null>(null)
  return (
    <section aria-labelledby="difference" className="border-area border-ink bg-window p-4">
      <div className="flex items-start gap-3">
        <Triangle size={24} />
        <div className="min-w-0 flex-1" role="alert">
          <h2 id="difference" className="text-lead">
            {errors[failure.code].sentence}
          </h2>
          {failure.details && (
            <ul className="mt-2">
              {failure.details.map((detail) => (
                <li key={detail} className="border-b border-line py-2 text-dense first-letter:uppercase">
                  {detail}
                </li>
              ))}
            </ul>
          )}
        </div>
      </div>
      <div className="mt-4 flex flex-col gap-3">
        <Choice
          label="Which connectors hold"
          options={choices}
          value={choice}
          onChange={setChoice}
          size="bay"
          fill
          className="max-w-lg"
        />
        <p className="min-h-11 text-body text-ink-2" aria-live="polite">
          {choice ? consequences[choice] : 'Nothing was brought in yet.'}
        </p>
        <div>
          <Button
            look="filled"
            size="bay"
            disabled={choice === null || sending}
            onClick={() => choice && onChoose(choice)}
          >
            {sending ? 'Bringing it in' : 'Bring it in'}
          </Button>
        </div>
      </div>
    </section>
  )
}
