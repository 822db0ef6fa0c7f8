import { render, screen } from '@testing-library/react'
import { renderToString } from 'react-dom/server'
import { describe, expect, it, vi } from 'vitest'
import { InBrowser } from '@/components/shell/in-browser'

describe('what is rendered in the browser alone', () => {
  it('costs the server nothing and takes the place of what waits for it', () => {
    const draw = vi.fn(() => <p>drawn</p>)
    const Drawing = () => draw()
    const page = (
      <InBrowser waiting={<p>waiting</p>}>
        <Drawing />
      </InBrowser>
    )
    expect(renderToString(page)).toBe('<p>waiting</p>')
    expect(draw).not.toHaveBeenCalled()
    render(page)
    expect(screen.queryByText('waiting')).toBeNull()
    expect(screen.getByText('drawn')).toBeTruthy()
  })
})
