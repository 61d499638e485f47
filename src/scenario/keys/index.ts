import { type CheckedKeys, choice, count, group, list, quantity, range, table, text } from '../schema.ts'
import { clock, divider, jitterBudget, loop, oscillator } from './clocking.ts'
import { channel, examine, fec, noise, pads, receiver, transmitter } from './link.ts'

const COMMON = 'common practice, no source'

const multiple = (usedBy: string, what: string, symbol: string, value: string, inPractice: string) =>
  quantity({
    usedBy: [usedBy],
    meaning: `Rule of thumb for the ${what}: device speed over operating frequency.`,
    symbol,
    unit: '1',
    min: 0.5,
    max: 40,
    default: value,
    source: `common practice, no source: ${inPractice}`,
  })
const ruleFormula = (what: string) =>
  text({
    meaning: `Rule for the ${what} as an arithmetic expression over f_op, f_B, f_N, f_ck, f_osc, beta and k (all SI).`,
    longest: 200,
  })

/** Where the demand on device speed comes from. */
const demand = group('Where the demand on device speed comes from.', {
  route: choice(['stricter', 'rule', 'derived'], {
    meaning: 'Which demand governs: the rule of thumb, the derived closed form, or the stricter of both.',
    default: 'stricter',
    source: 'method of this planner: both are always computed and shown',
  }),
  multiples: group('Rule-of-thumb multiples k of the operating frequency.', {
    lc_oscillator: multiple('lc_oscillator', 'LC oscillator', 'k', '3', '2.2 to 10'),
    ring_oscillator: multiple('ring_oscillator', 'ring oscillator', 'k', '6', '4 to 10'),
    divider: multiple('divider', 'first divider', 'k', '2.5', '2 to 3.5'),
    clock_buffers: multiple('clock_buffers', 'CML clock buffers', 'k', '5', '3 to 10'),
    multiplexer_2: multiple(
      'multiplexer',
      '2:1 output multiplexer',
      'k_mux',
      '2.3',
      'for each unit of fan-out into the driver',
    ),
    multiplexer_4: multiple(
      'multiplexer',
      '4:1 output multiplexer',
      'k_mux',
      '3.2',
      'for each unit of fan-out into the driver',
    ),
    driver: multiple('driver', 'output driver', 'k', '3', '2 to 5'),
    equaliser: multiple('equaliser', 'receive equaliser', 'k', '5', '3 to 6'),
    sampler: multiple('sampler', 'sampler', 'k', '8', '5 to 10'),
    first_tap: multiple(
      'first_tap',
      'first decision-feedback tap',
      'k',
      '3',
      '2 to 4; dynamic slicers about 6',
    ),
    first_tap_dynamic: multiple(
      'first_tap',
      'first decision-feedback tap with dynamic slicers',
      'k',
      '6',
      'about 6',
    ),
    track_and_hold: multiple('track_and_hold', 'track-and-hold', 'k', '4', '3 to 6'),
    interpolator: multiple('interpolator', 'phase interpolator', 'k', '5.5', '3 to 6'),
  }),
  formulas: group('Rules given as formulas; each replaces the multiple of its sub-block.', {
    lc_oscillator: ruleFormula('LC oscillator'),
    ring_oscillator: ruleFormula('ring oscillator'),
    divider: ruleFormula('first divider'),
    clock_buffers: ruleFormula('CML clock buffers'),
    multiplexer: ruleFormula('output multiplexer'),
    driver: ruleFormula('output driver'),
    equaliser: ruleFormula('receive equaliser'),
    sampler: ruleFormula('sampler'),
    first_tap: ruleFormula('first decision-feedback tap'),
    track_and_hold: ruleFormula('track-and-hold'),
    interpolator: ruleFormula('phase interpolator'),
  }),
})

const PEAKING = ['none', 'shunt-delay', 'shunt-flat', 'shunt-bridged'] as const
const peakingOf = (what: string, usedBy: readonly string[]) =>
  choice(PEAKING, {
    meaning: `Inductive peaking of the ${what}: none, shunt for best group delay, maximally flat shunt, bridged shunt.`,
    default: 'none',
    source: COMMON,
    usedBy,
  })

/** The keys that an option may override. */
export const optionKeys = {
  data_rate: quantity({
    meaning: 'Data rate of one lane.',
    symbol: 'R_b',
    unit: 'bit/s',
    shown: 'Gb/s',
    min: 1e6,
    max: 1e12,
  }),
  modulation: choice(['PAM-2', 'PAM-4', 'PAM-8'], { meaning: 'Pulse-amplitude modulation.' }),
  clocking: choice(['full-rate', 'half-rate', 'quarter-rate', 'eighth-rate'], {
    meaning: 'Clock frequency relative to the symbol rate; half-rate uses both edges.',
  }),
  error_ratio: quantity({
    meaning: 'Error ratio of the detector before error correction.',
    symbol: 'BER',
    unit: '1',
    min: 1e-30,
    max: 0.1,
    uncertain: false,
    usedBy: ['sampler', 'track_and_hold', 'channel', 'fec', 'jitter'],
  }),
  process: group('Corner, temperature and ageing.', {
    corner: choice(['worst', 'slow', 'typical', 'fast'], {
      meaning: 'Process corner to judge at; `worst` judges each check at its own worst.',
      default: 'worst',
      source: COMMON,
    }),
    temperature: range({
      meaning: 'Junction temperature range.',
      symbol: 'T',
      unit: 'K',
      shown: '°C',
      min: 200,
      max: 450,
      default: ['-40 °C', '125 °C'],
      source: 'common practice, no source: industrial range',
    }),
    typical_temperature: quantity({
      meaning: 'Junction temperature of the typical operating point.',
      symbol: 'T',
      unit: 'K',
      shown: '°C',
      min: 200,
      max: 450,
      default: '27 °C',
      source: 'common practice, no source: the temperature of published device data',
      uncertain: false,
    }),
    ageing: quantity({
      meaning: 'Threshold shift over life, added at the slow corner.',
      symbol: 'dV_age',
      unit: 'V',
      shown: 'mV',
      min: 0,
      max: 0.2,
      default: '25 mV',
      source: COMMON,
    }),
  }),
  supply: group('Supplies of the block.', {
    use: choice(['by-stage', 'core', 'analogue', 'io'], {
      meaning:
        "Supply of the stacked stages: `by-stage` takes the node's analogue supply where it has one, else core.",
      default: 'by-stage',
      source: 'method of this planner',
    }),
    voltage: quantity({
      meaning: "Nominal voltage of the stacked stages' supply, when it is not the node's own.",
      symbol: 'V_nom',
      unit: 'V',
      min: 0.3,
      max: 5,
    }),
    lift: quantity({
      meaning:
        "Step of the stacked stages' supply above the supply that they would have: an analogue supply a fixed step above core.",
      symbol: 'V_lift',
      unit: 'V',
      shown: 'mV',
      min: 0,
      max: 1,
    }),
    core_voltage: quantity({
      meaning: "Nominal core supply, when it is not the node's own.",
      symbol: 'V_nom',
      unit: 'V',
      min: 0.3,
      max: 5,
    }),
    tolerance: quantity({
      meaning: "Supply tolerance; the node's own when absent.",
      symbol: 'tol_V',
      unit: '1',
      shown: '%',
      min: 0,
      max: 0.2,
    }),
    regulator_dropout: quantity({
      meaning: 'Dropout of a regulator in front of the block.',
      symbol: 'V_do',
      unit: 'V',
      shown: 'mV',
      min: 0,
      max: 1,
      default: '0 mV',
      source: COMMON,
    }),
    ir_drop: quantity({
      meaning: 'Voltage lost in the supply wiring.',
      symbol: 'V_ir',
      unit: 'V',
      shown: 'mV',
      min: 0,
      max: 0.5,
      default: '0 mV',
      source: COMMON,
    }),
  }),
  headroom: group('Voltages that the stacked stages spend.', {
    clock_swing: quantity({
      meaning: 'Single-ended swing of clock and logic stages.',
      usedBy: [
        'clock_buffers',
        'ring_oscillator',
        'interpolator',
        'multiplexer',
        'driver',
        'jitter',
        'loop',
        'power',
        'transmit_pad',
      ],
      symbol: 'V_sw',
      unit: 'V',
      min: 0.05,
      max: 1,
      default: '0.30 V',
      source: COMMON,
    }),
    latch_swing: quantity({
      meaning: 'Single-ended swing inside latches.',
      usedBy: ['divider', 'sampler', 'first_tap', 'power'],
      symbol: 'V_sw',
      unit: 'V',
      min: 0.05,
      max: 1,
      default: '0.25 V',
      source: COMMON,
    }),
    data_swing: quantity({
      meaning: 'Single-ended swing I R of linear data stages; raised where linearity needs it.',
      symbol: 'V_sw0',
      unit: 'V',
      min: 0.05,
      max: 1,
      default: '0.30 V',
      source: COMMON,
    }),
    reserve: quantity({
      meaning: 'Voltage kept in hand in every headroom line.',
      symbol: 'V_m',
      unit: 'V',
      shown: 'mV',
      min: 0,
      max: 0.3,
      default: '50 mV',
      source: COMMON,
      uncertain: false,
    }),
    tail: quantity({
      meaning: 'Least voltage across a tail current source.',
      symbol: 'V_t0',
      unit: 'V',
      min: 0.03,
      max: 0.5,
      default: '0.12 V',
      source: COMMON,
    }),
    latch_stack: choice(['by-supply', 'three-high', 'tail-less'], {
      meaning: 'Stack of latches, multiplexers and interpolators: `by-supply` drops the tail below 0.9 V.',
      default: 'by-supply',
      source: COMMON,
    }),
  }),
  peaking: group('Inductive bandwidth extension.', {
    clock: peakingOf('clock buffers, dividers and interpolators', [
      'clock_buffers',
      'divider',
      'interpolator',
    ]),
    transmit: peakingOf('multiplexer and pre-driver', ['multiplexer', 'driver']),
    receive: peakingOf('receive equaliser and flip-flops', ['equaliser', 'sampler', 'first_tap']),
  }),
  demand,
  guard: quantity({
    meaning: 'Reserve above break-even that a pass needs.',
    symbol: 'guard',
    unit: '1',
    shown: '%',
    min: 0,
    max: 1,
    default: '15 %',
    source: 'method of this planner',
    uncertain: false,
  }),
  oscillator,
  divider,
  clock,
  loop,
  jitter_budget: jitterBudget,
  transmitter,
  receiver,
  pads,
  channel,
  noise,
  fec,
  power_budget: quantity({
    meaning: 'Allowed power. Writing it asks for the check.',
    symbol: 'P',
    unit: 'W',
    shown: 'mW',
    min: 1e-6,
    max: 100,
    usedBy: ['power'],
  }),
  examine,
}

/** The keys of the scenario itself. */
export const scenarioKeys = {
  format: count({ meaning: 'Version of the scenario format.', min: 1, max: 1, required: true }),
  title: text({ meaning: 'Title of the memo.', longest: 200, required: true }),
  question: text({ meaning: 'The question the memo answers.', longest: 500 }),
  revision: text({ meaning: 'Revision of the scenario.', longest: 20 }),
  date: text({
    meaning: 'Date printed on the memo.',
    longest: 10,
    pattern: { is: /^\d{4}-\d{2}-\d{2}$/, say: 'a date as YYYY-MM-DD' },
  }),
  authors: list({ meaning: 'Who wrote the scenario.', longest: 20 }),
  notes: text({
    meaning: 'Remarks printed in the memo, for instance which numbers are invented.',
    longest: 4000,
  }),
  include: list({ meaning: 'Scenario files whose keys this one takes over; its own keys win.', longest: 8 }),
  block: choice(['link', 'clock'], {
    meaning: 'What is planned: one lane of a link, or a clock generator.',
    required: true,
  }),
  nodes: list({
    meaning: 'Process candidates: ids of built-in classes, or paths of node files.',
    longest: 40,
    required: true,
  }),
  cost_index: table({ meaning: 'Relative cost by node id.', unit: '1', min: 0, max: 1e6 }),
}

/** The checked settings of one option, in SI. Absent values and sections are null. */
export type Settings = CheckedKeys<typeof optionKeys>
export type ScenarioHead = CheckedKeys<typeof scenarioKeys>
