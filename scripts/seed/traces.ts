import type { Condition } from '@/diagrams/document/condition-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Probe } from '@/diagrams/document/reading-schema'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'

/** A trace of the demo scenario: what was probed on a circuit with this fault in. The figures are measured, not written. */
export interface DemoTrace {
  /** Title of the sample it is made on. */
  circuit: string
  vehicle: string
  complaint: string
  codes: string[]
  fault: PlantedFault
  probes: Probe[]
  /** Left out: the trace is still open. */
  ending?: { note: string; proof: Probe }
  hoursAgo: number
}

const when = (controls: Condition['controls'], more: Partial<Condition> = {}): Condition => ({
  ...restCondition,
  controls,
  ...more,
})
const volts = (red: string, condition: Condition, black = 'chassis'): Probe => ({
  kind: 'volts',
  red,
  black,
  condition,
})
const works = (node: string, condition: Condition): Probe => ({ kind: 'works', node, condition })

const keyOn = when({ key: 'on' })
const warm = when({ key: 'on', coolant: 'warm' })
const allLamps = when({ lights: 'on', brake: 'held' })

export const demoTraces: DemoTrace[] = [
  {
    circuit: 'Load space lamp request',
    vehicle: 'Tarnmoor 35 van, 2022, fleet number 12',
    complaint: 'Load space stays dark with the key on.',
    codes: ['B1A31-14'],
    fault: { site: 'wire:w6', mode: 'open' },
    probes: [
      volts('body.5', keyOn),
      volts('c12-3.a', keyOn),
      volts('c12-3.b', keyOn),
      volts('body.5', when({ key: 'on' }, { unplugged: ['bm-a'] })),
    ],
    ending: {
      note: 'Wire broken under the sill trim, 40 cm from C12. Joined and sealed.',
      proof: volts('body.5', keyOn),
    },
    hoursAgo: 52,
  },
  {
    circuit: 'Two-speed cooling fan',
    vehicle: 'Bracken L4 estate, 2021',
    complaint: 'Fan silent when warm, runs fast when hot.',
    codes: ['P1A48-13'],
    fault: { site: 'part:k1.coil', mode: 'open' },
    probes: [
      works('m1', when({ key: 'on', coolant: 'hot' })),
      works('m1', warm),
      volts('k1.86', warm),
      volts('k1.85', when({ key: 'on' })),
      {
        kind: 'ohms',
        red: 'k1.86:part',
        black: 'k1.85:part',
        condition: when({}, { battery: false, unplugged: ['k1-x'] }),
      },
    ],
    ending: { note: 'Coil of K1 open. Relay renewed.', proof: works('m1', warm) },
    hoursAgo: 27,
  },
  {
    circuit: 'Trailer stop and tail lamps',
    vehicle: 'Tarnmoor 35 van, 2022, fleet number 7',
    complaint: 'Trailer lamps dim when braking with the lights on.',
    codes: [],
    fault: { site: 'part:g9', mode: 'resistive', ohms: 1.2 },
    probes: [works('e1', allLamps), volts('c40-5.a', allLamps)],
    hoursAgo: 3,
  },
]
