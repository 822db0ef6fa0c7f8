import type { ReactNode } from 'react'

/** The sheet with a finished circuit drawn faintly over one sentence and one button. */
export function EmptySheet({ title, children }: { title: string; children?: ReactNode }) {
  return (
    <div className="flex flex-1 flex-col items-center justify-center overflow-hidden bg-sheet px-5 py-10">
      <svg
        viewBox="0 0 900 260"
        aria-hidden="true"
        className="h-auto w-full max-w-4xl [&_*]:[vector-effect:non-scaling-stroke]"
        fill="none"
        style={{ stroke: 'var(--line)' }}
        strokeWidth="3"
      >
        <path d="M40 100h60l26 24-26 24H40z" />
        <path d="M126 124h54M250 124h110v-64h90M360 124v72h220M530 60h50M720 196h60v20M690 60h150" />
        <path d="M180 110h70v28h-70zM180 124h70" />
        <path d="M450 38h80v44h-80zM466 60h14M500 60h14M480 60l26-14" />
        <rect x="580" y="30" width="110" height="196" />
        <path d="M600 46h40v28h-40zM612 74l16-28M620 74v90M600 196h20l36-18M664 196h56" />
        <path d="M762 216h36M769 224h22M776 232h8" />
        <circle cx="360" cy="124" r="6" style={{ fill: 'var(--line)' }} />
      </svg>
      <div className="mt-8 max-w-lg text-center">
        <h1 className="text-title">{title}</h1>
        {children && <div className="mt-4 flex flex-wrap justify-center gap-2 text-body">{children}</div>}
      </div>
    </div>
  )
}
