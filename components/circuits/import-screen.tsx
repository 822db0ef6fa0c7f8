'use client'

import { useMutation, useQueryClient } from '@tanstack/react-query'
import Link from 'next/link'
import { useRef, useState } from 'react'
import { createCircuit } from '@/lib/client/api/circuits'
import { newId } from '@/lib/client/new-id'
import type { ConnectorChoice, StoredCircuit } from '@/lib/shared/api/circuits'
import type { Failure } from '@/lib/shared/result'
import { Band } from '../ui/band'
import { Button, ButtonLink } from '../ui/button'
import { TextArea } from '../ui/field'
import { ConnectorDifference } from './connector-difference'
import { DocumentSummary } from './document-summary'
import { ExportLink } from './export-link'
import { ProblemList } from './problem-list'
import { type ReadDocument, readDocument } from './read-document'

/** Bringing in a circuit document: file or text, its problems with paths, connectors that differ, done. */
export function ImportScreen() {
  const [text, setText] = useState('')
  const [fileName, setFileName] = useState<string | null>(null)
  const [read, setRead] = useState<ReadDocument | null>(null)
  const [failure, setFailure] = useState<Failure | null>(null)
  const [stored, setStored] = useState<StoredCircuit | null>(null)
  // One id a document: sending it twice over a bad network makes one circuit.
  const [id, setId] = useState(newId)
  const file = useRef<HTMLInputElement>(null)
  const queries = useQueryClient()

  const send = useMutation({
    mutationFn: ({ document, connectors }: { document: unknown; connectors: ConnectorChoice }) =>
      createCircuit({ id, document, connectors }),
    onSuccess: (called) => {
      if (called.ok) {
        setStored(called.value)
        setFailure(null)
        void queries.invalidateQueries({ queryKey: ['circuits'] })
      } else setFailure(called.failure)
    },
  })

  function take(newText: string, name: string | null) {
    setText(newText)
    setFileName(name)
    setFailure(null)
    setStored(null)
    setId(newId())
    setRead(newText.trim() === '' ? null : readDocument(newText))
  }

  if (stored)
    return (
      <section className="bg-sheet border-area border-ink p-4 tablet:p-5" role="status">
        <h2 className="text-title">{stored.document.title} is in the library</h2>
        <p className="mt-2 text-body text-ink-2">
          Edition {stored.revision}, {stored.document.wires.length} wires, {stored.document.nodes.length}{' '}
          parts.
        </p>
        <div className="mt-4 flex flex-wrap gap-2">
          <ButtonLink href={`/circuits/${stored.id}`} look="filled" size="bay">
            Operate it
          </ButtonLink>
          <ExportLink circuitId={stored.id} size="bay" />
          <Button size="bay" onClick={() => take('', null)}>
            Bring in another
          </Button>
        </div>
      </section>
    )

  return (
    <div className="flex flex-col gap-5">
      <div className="flex flex-wrap items-center gap-3">
        <input
          ref={file}
          type="file"
          accept=".json,application/json"
          className="sr-only"
          tabIndex={-1}
          aria-label="Circuit document"
          onChange={async (event) => {
            const chosen = event.target.files?.[0]
            event.target.value = ''
            if (chosen) take(await chosen.text(), chosen.name)
          }}
        />
        <Button look={read?.ok ? 'plain' : 'filled'} size="bay" onClick={() => file.current?.click()}>
          Choose a file
        </Button>
        <span className="text-body text-ink-2">
          {fileName ?? 'or paste the document below; it is checked at once'}
        </span>
      </div>
      <TextArea
        label="Circuit document, JSON"
        figures
        rows={read?.ok ? 5 : 12}
        spellCheck={false}
        value={text}
        onChange={(event) => take(event.target.value, null)}
      />
      {read && !read.ok && (
        <section aria-label="Problems" role="alert" className="bg-sheet border-area border-ink p-4">
          <h2 className="text-lead mb-3">
            {read.problems.length === 1 ? '1 problem.' : `${read.problems.length} problems.`} Nothing was
            brought in.
          </h2>
          <ProblemList problems={read.problems} />
        </section>
      )}
      {read?.ok && (
        <>
          <DocumentSummary circuit={read.circuit} />
          {failure?.code === 'connector-differs' || failure?.code === 'connector-in-use' ? (
            <ConnectorDifference
              failure={failure}
              sending={send.isPending}
              onChoose={(connectors) => send.mutate({ document: read.document, connectors })}
            />
          ) : (
            <>
              {failure && (
                <Band title={failure.message}>
                  {failure.details && failure.details.length > 0 ? (
                    <ul>
                      {failure.details.map((detail) => (
                        <li key={detail}>{detail}</li>
                      ))}
                    </ul>
                  ) : (
                    'Nothing was brought in. The document is still here.'
                  )}
                </Band>
              )}
              <div className="flex flex-wrap gap-2">
                <Button
                  look="filled"
                  size="bay"
                  disabled={send.isPending}
                  onClick={() => send.mutate({ document: read.document, connectors: 'refuse' })}
                >
                  {send.isPending ? 'Bringing it in' : 'Bring it in'}
                </Button>
              </div>
            </>
          )}
        </>
      )}
      <p className="text-small text-ink-2">
        The form of a document is written down as a{' '}
        <Link href="/api/v1/circuit-schema" prefetch={false}>
          JSON Schema
        </Link>
        .
      </p>
    </div>
  )
}
