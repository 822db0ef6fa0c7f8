import '@testing-library/jest-dom/vitest'
import { cleanup } from '@testing-library/react'
import { afterEach } from 'vitest'

// jsdom measures nothing. The canvas needs sizes to draw wires, so every element answers with plausible ones.

class QuietResizeObserver implements ResizeObserver {
  constructor(private readonly callback: ResizeObserverCallback) {}
  observe(target: Element): void {
    const contentRect = target.getBoundingClientRect()
    this.callback([{ target, contentRect } as ResizeObserverEntry], this)
  }
  unobserve(): void {}
  disconnect(): void {}
}

class PlainMatrix {
  readonly m22: number
  constructor(transform?: string) {
    const scale = transform?.match(/scale\(([\d.]+)\)/)?.[1]
    this.m22 = scale === undefined ? 1 : Number(scale)
  }
}

const sizeOf = (element: HTMLElement, side: 'width' | 'height', otherwise: number) =>
  Number.parseFloat(element.style[side]) || otherwise

globalThis.ResizeObserver = QuietResizeObserver
Object.assign(globalThis, { DOMMatrixReadOnly: PlainMatrix })
Object.defineProperties(globalThis.HTMLElement.prototype, {
  offsetWidth: {
    configurable: true,
    get(this: HTMLElement) {
      return sizeOf(this, 'width', 100)
    },
  },
  offsetHeight: {
    configurable: true,
    get(this: HTMLElement) {
      return sizeOf(this, 'height', 40)
    },
  },
})
Object.assign(globalThis.SVGElement.prototype, { getBBox: () => ({ x: 0, y: 0, width: 0, height: 0 }) })

afterEach(cleanup)
