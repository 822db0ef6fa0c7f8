import { render } from '@testing-library/react'
import { expect, test } from 'vitest'
import { VerdictGlyph } from '@/components/ui/verdict-glyph'

test('the three verdicts differ in shape, not only in colour', () => {
  const shapes = (['faulty', 'in-question', 'proved-good'] as const).map((verdict) => {
    const { container, unmount } = render(<VerdictGlyph verdict={verdict} />)
    const shape = [...container.querySelectorAll('path, circle')]
      .map((element) => `${element.tagName} ${element.getAttribute('d') ?? 'round'}`)
      .join(' ')
    unmount()
    return shape
  })
  expect(new Set(shapes).size).toBe(3)
})

test('proved good is a bare tick without a container', () => {
  const { container } = render(<VerdictGlyph verdict="proved-good" />)
  expect(container.querySelectorAll('path')).toHaveLength(1)
  expect(container.querySelector('circle')).toBeNull()
})
