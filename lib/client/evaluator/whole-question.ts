import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Asked, Question } from './messages'

/** Puts the circuit of an earlier question to one that came without. */
export class WholeQuestions {
  private circuit: Circuit | null = null

  open({ question }: Asked): Question {
    const circuit = question.circuit ?? this.circuit
    if (!circuit) throw new Error('a question without a circuit before any with one')
    this.circuit = circuit
    return { ...question, circuit }
  }
}
