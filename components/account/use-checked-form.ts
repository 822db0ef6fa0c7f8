'use client'

import { useRef, useState } from 'react'
import type { z } from 'zod'

/** "email: expected an address" as it stands under its own field: "Expected an address." */
export function fieldSentence(message: string): string {
  const words = message.replace(/^[A-Za-z]+: /, '')
  const sentence = words.charAt(0).toUpperCase() + words.slice(1)
  return /[.?]$/.test(sentence) ? sentence : `${sentence}.`
}

/**
 * Values and messages of a plain form. A field is checked on leaving it and all are on sending; focus then goes
 * to the first refused one. What was typed is never cleared.
 */
export function useCheckedForm<Name extends string>(
  schema: z.ZodType,
  initial: Record<Name, string>,
): {
  values: Record<Name, string>
  errors: Partial<Record<Name, string>>
  fieldProps: (name: Name) => {
    name: Name
    value: string
    error: string | undefined
    onChange: (event: { target: { value: string } }) => void
    onBlur: () => void
    ref: (element: HTMLInputElement | null) => void
  }
  set: (name: Name, value: string) => void
  refuse: (name: Name, message: string) => void
  check: () => boolean
} {
  const [values, setValues] = useState(initial)
  const [errors, setErrors] = useState<Partial<Record<Name, string>>>({})
  const elements = useRef(new Map<Name, HTMLInputElement>())
  const names = Object.keys(initial) as Name[]

  const problems = (): Partial<Record<Name, string>> => {
    const parsed = schema.safeParse(values)
    const found: Partial<Record<Name, string>> = {}
    if (parsed.success) return found
    for (const issue of parsed.error.issues) {
      const name = issue.path[0] as Name
      found[name] ??= fieldSentence(issue.message)
    }
    return found
  }
  const focusFirst = (found: Partial<Record<Name, string>>) => {
    const first = names.find((name) => found[name])
    if (first) elements.current.get(first)?.focus()
  }

  return {
    values,
    errors,
    set: (name, value) => setValues((before) => ({ ...before, [name]: value })),
    refuse: (name, message) => {
      setErrors((before) => ({ ...before, [name]: message }))
      elements.current.get(name)?.focus()
    },
    check: () => {
      const found = problems()
      setErrors(found)
      focusFirst(found)
      return Object.keys(found).length === 0
    },
    fieldProps: (name) => ({
      name,
      value: values[name],
      error: errors[name],
      onChange: (event) => {
        const { value } = event.target
        setValues((before) => ({ ...before, [name]: value }))
        // A message goes as soon as the field changes; it comes back on leaving if it still holds.
        setErrors((before) => ({ ...before, [name]: undefined }))
      },
      onBlur: () => {
        // Leaving an empty field says nothing yet: one may only be passing through.
        if (values[name] !== '') setErrors((before) => ({ ...before, [name]: problems()[name] }))
      },
      ref: (element) => {
        if (element) elements.current.set(name, element)
        else elements.current.delete(name)
      },
    }),
  }
}
