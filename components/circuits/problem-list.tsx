import type { Problem } from '@/diagrams/document/check-circuit'

const most = 100

/** Problems of a document: where, then what. */
export function ProblemList({ problems }: { problems: Problem[] }) {
  return (
    <div>
      <div
        aria-hidden="true"
        className="hidden tablet:grid grid-cols-[18rem_minmax(0,1fr)] gap-x-4 border-b-2 border-ink pb-2 text-[0.84375rem] font-bold text-ink-2"
      >
        <span>Where in the document</span>
        <span>What is wrong</span>
      </div>
      <ol>
        {problems.slice(0, most).map((problem, index) => (
          <li
            key={`${index}-${problem.path}`}
            className="grid min-h-target items-center gap-x-4 border-b border-line py-2 text-dense tablet:grid-cols-[18rem_minmax(0,1fr)]"
          >
            <span className="figures break-all font-bold">{problem.path || 'the document itself'}</span>
            <span>{problem.message}</span>
          </li>
        ))}
      </ol>
      {problems.length > most && (
        <p className="mt-3 text-body text-ink-2">and {problems.length - most} more</p>
      )}
    </div>
  )
}
