'use client'

import { type CSSProperties, useMemo, useRef, useState } from 'react'
import { pathOrder } from '@/diagrams/drawing/path-order'
import type { NextReading } from '@/diagrams/faults/answer'
import { useAnswer } from '@/lib/client/evaluator/use-answer'
import { useKeyCommands } from '@/lib/client/keys/use-key-commands'
import type { Trace } from '@/lib/shared/api/traces'
import { CircuitSheet } from '../canvas/circuit-sheet'
import type { Picked } from '../canvas/pick-at'
import { circuitModes } from '../operate/circuit-modes'
import { ModeSwitch } from '../shell/mode-switch'
import { RunningHead } from '../shell/running-head'
import { Button } from '../ui/button'
import { CautionPlate, CautionsDialog } from './cautions'
import { CountLegend } from './count-legend'
import { EntryScreen } from './entry-screen'
import { FinishDialog } from './finish/finish-dialog'
import { KeysDialog } from './keys-dialog'
import { MeterPanel } from './meter/meter-panel'
import { nextTitle } from './next-words'
import { PlaceNote } from './place-note'
import { ReadingsList } from './readings-list'
import { RuleCount } from './rule/rule-count'
import { SplitRule } from './rule/split-rule'
import { SavedState } from './saved-state'
import { traceOverlay } from './trace-overlay'
import { TraceBands } from './trace-bands'
import { TraceResult } from './trace-result'
import { TrayHandle, type TrayHeight } from './tray-handle'
import { useMeter } from './use-meter'
import { useTrace } from './use-trace'
import { useTypingIntoMeter } from './use-typing-into-meter'
import { verdictCounts } from './verdict-counts'

/** A trace from the first reading to the proof: sheet, split rule, tray. */
export function TraceScreen({ initial }: { initial: Trace }) {
  const work = useTrace(initial)
  const { trace, readings } = work
  // The edition a trace was started on never changes, so the circuit keeps its identity over every answer.
  const [circuit] = useState(initial.circuit.document)
  const codesKey = trace.codes.join(' ')
  const codes = useMemo(() => (codesKey === '' ? [] : codesKey.split(' ')), [codesKey])
  const { answer, current, failed } = useAnswer(circuit, readings, codes)
  const started = readings.length > 0
  const done = trace.state === 'done'
  const counts = verdictCounts(current ? answer : null)

  const [chosen, setChosen] = useState<{ next: NextReading; of: unknown } | null>(null)
  const offered = current && answer && !done ? answer.next : []
  const next = (chosen && chosen.of === answer ? chosen.next : offered[0]) ?? null
  const located = answer?.outcome === 'located' || answer?.outcome === 'no-fault'

  const [asking, setAsking] = useState(
    circuit.cautions.length > 0 && initial.cautionsAnsweredAt === null && !done,
  )
  const [finishing, setFinishing] = useState(false)
  const [entering, setEntering] = useState(false)
  const [showingKeys, setShowingKeys] = useState(false)
  const [site, setSite] = useState<string | null>(null)
  const [tray, setTray] = useState<TrayHeight>(276)
  const field = useRef<HTMLInputElement>(null)

  const meter = useMeter(circuit, next, {
    mayEnter() {
      if (circuit.cautions.length === 0 || work.cautionsAnswered) return true
      setAsking(true)
      return false
    },
    onEnter(reading) {
      work.enter(reading)
      setSite(null)
      setEntering(false)
    },
  })
  const setFor = (wanted: NextReading) => {
    setChosen({ next: wanted, of: answer })
    meter.act({ do: 'set-for', next: wanted })
  }
  const onPick = (picked: Picked | null) => {
    if (!picked) return setSite(null)
    if ('point' in picked) return done ? undefined : meter.act({ do: 'tap-point', point: picked.point })
    if ('wire' in picked) {
      if (meter.state.kind === 'amps' && !done) meter.act({ do: 'tap-wire', wire: picked.wire })
      return setSite(`wire:${picked.wire}`)
    }
    const load = circuit.nodes.some((node) => node.id === picked.node && node.kind === 'load')
    if (load && meter.state.kind === 'works' && !done) meter.act({ do: 'tap-load', node: picked.node })
    setSite(picked.site ?? placeOf(answer?.sites.map((one) => one.site) ?? [], picked.node))
  }

  const legs = useMemo(
    () => pathOrder(circuit, new Map((answer?.sites ?? []).map((one) => [one.site, one.probability]))),
    [circuit, answer],
  )
  /** To the neighbouring place in path order; once something is cleared, among those left. */
  const walk = (by: number) => {
    const verdicts = new Map((answer?.sites ?? []).map((one) => [one.site, one.verdict]))
    const all = legs.flatMap((leg) => leg.sites)
    const left = all.filter((one) => verdicts.get(one) !== 'proved-good')
    const among = started && left.length > 0 ? left : all
    const at = site === null ? (by > 0 ? -1 : among.length) : among.indexOf(site)
    setSite(among[(at + by + among.length) % among.length] ?? null)
  }
  useTypingIntoMeter(field, meter.act, !done && meter.state.kind !== 'works')
  useKeyCommands({
    m: () => field.current?.focus(),
    n: () => next && setFor(next),
    'ctrl+z': () => !done && work.undo(),
    'ctrl+shift+z': () => !done && work.redo(),
    Enter: () => !done && meter.enter(),
    '[': () => walk(-1),
    ']': () => walk(1),
    Escape: () => setSite(null),
    '?': () => setShowingKeys(true),
    '/': () => location.assign('/circuits'),
  })

  const { condition } = meter.state
  const overlay = useMemo(
    () => traceOverlay({ circuit, readings, answer, condition, next: located ? null : next }),
    [circuit, readings, answer, condition, next, located],
  )
  const picked = answer?.sites.find((one) => one.site === site) ?? null
  const code = trace.codes[0] ?? null
  const left = counts
    ? `${started ? counts.faulty || counts.inQuestion : counts.all} ${started && counts.faulty > 0 ? 'faulty' : 'in question'}`
    : '-'
  const foot = `${readings.length} ${readings.length === 1 ? 'reading' : 'readings'}`
  const saved = <SavedState state={work.state} done={done} />

  return (
    <div
      className="flex h-dvh flex-col max-tablet:h-auto max-tablet:min-h-dvh max-tablet:pb-20"
      data-outcome={current ? answer?.outcome : 'asking'}
    >
      <RunningHead
        circuit={{ title: circuit.title, vehicle: trace.vehicle || circuit.vehicle, code }}
        saved={saved}
        modes={
          <ModeSwitch
            modes={circuitModes(trace.circuit.id, `/circuits/${trace.circuit.id}/traces/${trace.id}`)}
            current="trace"
          />
        }
      />
      <main id="main" className="flex min-h-0 flex-1 flex-col">
        <TraceBands
          work={work}
          failed={failed}
          doubted={answer?.outcome === 'cannot-be' ? (answer.reading ?? null) : null}
        />
        <div className="relative min-h-52 flex-1 tablet:min-h-64 max-tablet:h-64 max-tablet:flex-none">
          <CircuitSheet
            circuit={circuit}
            overlay={overlay}
            picked={site?.startsWith('wire:') ? site.slice('wire:'.length) : null}
            leads={
              meter.state.kind === 'volts' || meter.state.kind === 'ohms'
                ? { red: meter.state.red, black: meter.state.black }
                : undefined
            }
            onPick={onPick}
            fitAgain={`${readings.length} ${current} ${answer?.outcome}`}
            label="Sheet: tap two points to set the leads"
            legend={
              <div className="flex flex-wrap items-center gap-3">
                <CountLegend counts={counts} started={started} />
                <CautionPlate
                  cautions={circuit.cautions}
                  answered={work.cautionsAnswered}
                  onOpen={() => setAsking(true)}
                />
              </div>
            }
          />
          {picked && (
            <PlaceNote circuit={circuit} site={picked} started={started} onClose={() => setSite(null)} />
          )}
        </div>
        <div className="z-rule flex flex-col gap-x-5 border-t-2 border-ink bg-panel px-3 py-1.5 tablet:px-4 laptop:h-[5.75rem] laptop:flex-row laptop:items-center laptop:py-0">
          <RuleCount
            counts={counts}
            started={started}
            outcome={current ? (answer?.outcome ?? null) : null}
            foot={foot}
          />
          <SplitRule
            circuit={circuit}
            legs={legs}
            answer={answer}
            started={started}
            next={located ? null : next}
            nextTitle={next ? nextTitle(circuit, next) : ''}
            onPlace={setSite}
          />
        </div>
        <div
          style={{ '--tray-height': `${tray}px` } as CSSProperties}
          className="relative z-rule grid min-h-0 border-t-2 border-ink bg-tray tablet:h-[38.5rem] tablet:flex-none tablet:grid-cols-2 tablet:grid-rows-[minmax(0,3fr)_minmax(0,2fr)] laptop:h-[var(--tray-height)] laptop:grid-cols-[24.125rem_25.75rem_minmax(0,1fr)] laptop:grid-rows-1"
        >
          <TrayHandle height={tray} onPull={setTray} />
          <div className="min-h-0 min-w-0 overflow-y-auto px-3 py-2.5 tablet:px-4 tablet:row-start-1 laptop:col-start-3 laptop:border-l laptop:border-line">
            <TraceResult
              circuit={circuit}
              work={work}
              answer={answer}
              current={current}
              next={next}
              others={offered.filter((other) => other !== next)}
              meter={meter}
              onChoose={setFor}
              onFinish={() => setFinishing(true)}
            />
          </div>
          <div className="hidden min-h-0 min-w-0 overflow-y-auto px-4 py-2.5 tablet:flex tablet:col-start-2 tablet:row-span-2 tablet:row-start-1 tablet:border-l tablet:border-line laptop:row-span-1">
            {done ? (
              <p className="text-ink-2">
                This trace is closed: its repair is proved. Start another one to take more readings.
              </p>
            ) : (
              <MeterPanel circuit={circuit} meter={meter} field={field} layout="tray" />
            )}
          </div>
          <div className="flex min-h-0 min-w-0 flex-col border-t border-line tablet:col-start-1 tablet:row-start-2 laptop:row-start-1 laptop:border-t-0">
            <ReadingsList
              circuit={circuit}
              readings={readings}
              answer={current ? answer : null}
              canUndo={!done}
              onUndo={work.undo}
              canRedo={!done && work.canRedo}
              onRedo={work.redo}
            />
          </div>
        </div>
      </main>
      {!done && (
        <div className="fixed inset-x-0 bottom-0 z-rule border-t-2 border-ink bg-panel p-2.5 tablet:hidden">
          <Button
            look="filled"
            size="bay"
            className="w-full"
            onClick={() => {
              if (next && meter.state.red === null && meter.state.wire === null && meter.state.node === null)
                setFor(next)
              setEntering(true)
            }}
          >
            Take the reading
          </Button>
        </div>
      )}
      {entering && !done && (
        <EntryScreen
          circuit={circuit}
          title={circuit.title}
          code={code}
          left={left}
          next={next}
          meter={meter}
          saved={saved}
          onClose={() => setEntering(false)}
        />
      )}
      <CautionsDialog
        cautions={circuit.cautions}
        answered={work.cautionsAnswered}
        open={asking}
        onAnswer={() => {
          work.answerCautions()
          setAsking(false)
        }}
        onClose={() => setAsking(false)}
      />
      <FinishDialog
        circuit={circuit}
        work={work}
        answer={answer}
        open={finishing}
        onClose={() => setFinishing(false)}
      />
      <KeysDialog open={showingKeys} onClose={() => setShowingKeys(false)} />
    </div>
  )
}

/** The place a part stands for when it has only one. */
function placeOf(sites: readonly string[], node: string): string | null {
  const own = sites.filter((site) => {
    const rest = site.slice(site.indexOf(':') + 1)
    return !site.startsWith('wire:') && (rest === node || rest.startsWith(`${node}.`))
  })
  return own.find((site) => site === `part:${node}` || site === `contact:${node}`) ?? own[0] ?? null
}
