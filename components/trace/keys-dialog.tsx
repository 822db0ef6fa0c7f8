'use client'

import { useState } from 'react'
import { readLettersOff, setLettersOff } from '@/lib/client/keys/use-key-commands'
import { Choice } from '../ui/choice'
import { Dialog } from '../ui/dialog'

const keys: readonly [string, string][] = [
  ['/', 'find a circuit'],
  ['M', 'meter'],
  ['0 to 9', 'type into the meter at once'],
  ['Enter', 'log the reading'],
  ['L', 'OL, in the meter'],
  ['Tab', 'red lead, black lead, conditions'],
  ['N', 'set the meter for the next split'],
  ['Ctrl Z', 'undo the last reading'],
  ['Ctrl Shift Z', 'redo'],
  ['F', 'fit what is left'],
  ['Home', 'whole sheet (0 types into the meter here)'],
  ['+ and -', 'larger and smaller'],
  ['arrows', 'pan the sheet'],
  ['[ and ]', 'walk to the neighbouring place; on a point of the sheet, to the next point'],
  ['Enter on a point', 'put the lead there'],
  ['Esc', 'let go'],
  ['?', 'this list'],
]

/** The list of keys, and the switch for single letters. */
export function KeysDialog({ open, onClose }: { open: boolean; onClose: () => void }) {
  return (
    <Dialog open={open} onClose={onClose} title="Keys">
      <LettersSwitch />
      <dl className="mt-3 grid max-h-[50dvh] grid-cols-[auto_1fr] gap-x-5 overflow-y-auto border-t border-line">
        {keys.map(([key, does]) => (
          <div key={key} className="contents">
            <dt className="figures border-b border-line py-1.5 font-bold">{key}</dt>
            <dd className="border-b border-line py-1.5">{does}</dd>
          </div>
        ))}
      </dl>
    </Dialog>
  )
}

function LettersSwitch() {
  const [off, setOff] = useState(readLettersOff)
  return (
    <Choice
      label="Single letters"
      showLabel
      options={[
        { value: 'on', label: 'On' },
        { value: 'off', label: 'Off' },
      ]}
      value={off ? 'off' : 'on'}
      onChange={(value) => {
        setLettersOff(value === 'off')
        setOff(value === 'off')
      }}
    />
  )
}
