import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { expect, test } from 'vitest'
import { Choice } from '@/components/ui/choice'

function Key() {
  const [position, setPosition] = useState<'off' | 'on'>('off')
  return (
    <>
      <Choice
        label="Key"
        options={[
          { value: 'off', label: 'off' },
          { value: 'on', label: 'on' },
        ]}
        value={position}
        onChange={setPosition}
      />
      <p>Key is {position}</p>
    </>
  )
}

test('joined buttons are one group of which exactly one is pressed', async () => {
  render(<Key />)
  expect(screen.getByRole('group', { name: 'Key' })).toBeInTheDocument()
  expect(screen.getByRole('radio', { name: 'off' })).toBeChecked()
  await userEvent.click(screen.getByRole('radio', { name: 'on' }))
  expect(screen.getByRole('radio', { name: 'on' })).toBeChecked()
  expect(screen.getByRole('radio', { name: 'off' })).not.toBeChecked()
  expect(screen.getByText('Key is on')).toBeInTheDocument()
})

test('the arrow keys move the choice', async () => {
  render(<Key />)
  await userEvent.tab()
  await userEvent.keyboard('{ArrowRight}')
  expect(screen.getByText('Key is on')).toBeInTheDocument()
})
