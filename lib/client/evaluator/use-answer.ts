import { useEffect, useMemo, useRef, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Answer } from '@/diagrams/faults/answer'
import type { Odds } from '@/diagrams/faults/odds-schema'
import type { Step } from '@/diagrams/faults/steps'
import type { Symptom } from '@/diagrams/faults/symptom-schema'
import { Evaluator, type Thread } from './evaluator'
import type { Question } from './messages'
import { numberedReadings } from './numbered-readings'

export interface AnswerState {
  /** The last answer given; stays while a newer one is being worked out, so that the drawing does not blink. */
  answer: Answer | null
  /** True once the answer belongs to the readings shown. */
  current: boolean
  failed: string | null
  /** How far the answer to these readings has come, once it takes long. */
  progress: Step | null
}

const startThread = (): Thread =>
  new Worker(new URL('./evaluator-worker.ts', import.meta.url), { type: 'module' })

/** The evaluator's answer to these readings, worked out in a thread of its own. */
export function useAnswer(
  circuit: Circuit,
  readings: readonly Reading[],
  codes: readonly string[],
  odds: Odds | null,
  symptoms: readonly Symptom[],
): AnswerState {
  const question = useMemo<Question>(
    () => ({
      circuit,
      readings: numberedReadings(readings),
      codes: [...codes],
      priors: 'trade',
      ...(odds ? { odds } : {}),
      ...(symptoms.length > 0 ? { symptoms: [...symptoms] } : {}),
    }),
    [circuit, readings, codes, odds, symptoms],
  )
  const [given, setGiven] = useState<{ question: Question; answer: Answer } | null>(null)
  const [failure, setFailure] = useState<{ question: Question; message: string } | null>(null)
  const [way, setWay] = useState<{ question: Question; step: Step } | null>(null)
  const evaluator = useRef<Evaluator | null>(null)

  useEffect(() => {
    const opened = new Evaluator(startThread, {
      answered: (answer, asked) => setGiven({ question: asked, answer }),
      failed: (message, asked) => setFailure({ question: asked, message }),
      progressed: (step, asked) => setWay({ question: asked, step }),
      later(milliseconds, run) {
        const timer = setTimeout(run, milliseconds)
        return () => clearTimeout(timer)
      },
    })
    evaluator.current = opened
    return () => {
      opened.close()
      evaluator.current = null
    }
  }, [])

  useEffect(() => {
    evaluator.current?.ask(question)
  }, [question])

  const sameCircuit = given?.question.circuit === circuit
  return {
    answer: given && sameCircuit ? given.answer : null,
    current: given?.question === question,
    failed: failure?.question === question ? failure.message : null,
    progress: way?.question === question && given?.question !== question ? way.step : null,
  }
}
