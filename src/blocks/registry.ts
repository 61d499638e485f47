import { clockBuffers } from './clock-buffers.ts'
import { cmosClockBuffers } from './cmos-clock-buffers.ts'
import { divider } from './divider.ts'
import { driver } from './driver.ts'
import { equaliser } from './equaliser.ts'
import { firstTap } from './first-tap.ts'
import { interpolator } from './interpolator.ts'
import { lcOscillator } from './lc-oscillator.ts'
import { multiplexer } from './multiplexer.ts'
import { receivePad, transmitPad } from './pads.ts'
import { ringOscillator } from './ring-oscillator.ts'
import { sampler } from './sampler.ts'
import type { AnySubBlock } from './sub-block.ts'
import { trackAndHold } from './track-and-hold.ts'

/** Every sub-block, in the order of the signal: clock first, then transmit, then receive, then pads. */
export const SUB_BLOCKS: readonly AnySubBlock[] = [
  lcOscillator,
  ringOscillator,
  divider,
  clockBuffers,
  cmosClockBuffers,
  interpolator,
  multiplexer,
  driver,
  equaliser,
  sampler,
  firstTap,
  trackAndHold,
  transmitPad,
  receivePad,
]
