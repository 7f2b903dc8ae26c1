import type { EquipmentKind } from '../../../shared/domain/equipment-kinds'
import { around, disc, knob, labelledKnob, lamp, lettering, meter, rect, screw, socket, stroke, ticks } from './primitives'

/** A finish of the trade: case, panel, lettering. */
export interface Finish { case: string, panel: string, ink: string }
export const FINISHES: readonly Finish[] = [
  { case: '#3d4440', panel: '#6d7771', ink: '#f1ede0' },
  { case: '#23332d', panel: '#2f5d50', ink: '#f1ede0' },
  { case: '#1d1e1d', panel: '#2b2c2b', ink: '#e9e3d0' },
  { case: '#6b5a41', panel: '#d8ccae', ink: '#2a2a26' },
  { case: '#4a5560', panel: '#8f9aa1', ink: '#16191a' },
  { case: '#53483c', panel: '#b9b2a0', ink: '#22221f' },
]

export interface Frame { x: number, y: number, width: number, height: number }
interface Drawing { frame: Frame, finish: Finish, random: () => number }
type Panel = (drawing: Drawing) => string

/** Where each kind stands in the picture: a rack instrument is wide, a portable tall. */
const FRAMES: Record<EquipmentKind, Frame> = {
  rf_generator: { x: 190, y: 190, width: 900, height: 560 }, sweep_generator: { x: 190, y: 200, width: 900, height: 540 },
  stereo_generator: { x: 180, y: 300, width: 920, height: 370 }, audio_oscillator: { x: 280, y: 170, width: 720, height: 580 },
  oscilloscope: { x: 330, y: 110, width: 620, height: 680 }, voltmeter: { x: 390, y: 150, width: 500, height: 620 },
  multimeter: { x: 430, y: 190, width: 420, height: 580 }, bridge: { x: 260, y: 190, width: 760, height: 560 },
  counter: { x: 170, y: 330, width: 940, height: 350 }, power_supply: { x: 250, y: 250, width: 780, height: 480 },
  valve_tester: { x: 190, y: 180, width: 900, height: 600 }, communications_receiver: { x: 130, y: 210, width: 1020, height: 520 },
  domestic_receiver: { x: 170, y: 230, width: 940, height: 520 }, tuner: { x: 150, y: 360, width: 980, height: 320 },
  amplifier: { x: 170, y: 340, width: 940, height: 340 }, transceiver: { x: 260, y: 370, width: 760, height: 310 },
  other: { x: 300, y: 240, width: 680, height: 500 },
}
export const frameOf = (kind: EquipmentKind) => FRAMES[kind]

/** A tuning dial: cream face, engraved arcs, a cursor. */
function bigDial(x: number, y: number, radius: number, angle: number): string {
  const [cx, cy] = around(x, y, radius * 0.92, angle)
  return disc(x + 5, y + 8, radius + 6, 'rgb(0 0 0 / .3)') + disc(x, y, radius + 6, '#1b1c1b') + disc(x, y, radius, '#efe6cc')
    + [0.92, 0.78, 0.64].map((part, index) => ticks(x, y, radius * part * 0.93, radius * part, -150, 150, 50 - index * 10, '#2a2a26')).join('')
    + stroke(x, y, cx, cy, '#9c2a20', 3) + knob(x, y, radius * 0.38, angle)
}

const controlRow = ({ frame, finish, random }: Drawing, y: number, words: readonly string[], radius = 34, from = 0.1, to = 0.9) =>
  words.map((word, index) => labelledKnob(
    frame.x + frame.width * (from + (to - from) * (words.length === 1 ? 0.5 : index / (words.length - 1))), frame.y + frame.height * y, radius, -130 + 260 * random(), word, finish.ink,
  )).join('')

const generator: Panel = (drawing) => {
  const { frame, finish, random } = drawing
  return bigDial(frame.x + frame.width * 0.33, frame.y + frame.height * 0.42, frame.height * 0.3, -110 + 220 * random())
    + meter(frame.x + frame.width * 0.64, frame.y + frame.height * 0.12, frame.width * 0.27, frame.height * 0.32, 0.55 + random() * 0.3, 'SET LEVEL')
    + controlRow(drawing, 0.82, ['BAND', 'MOD', 'LEVEL', 'STEPS'], 36, 0.1, 0.72) + socket(frame.x + frame.width * 0.83, frame.y + frame.height * 0.82, 22)
    + socket(frame.x + frame.width * 0.92, frame.y + frame.height * 0.82, 22) + labelledKnob(frame.x + frame.width * 0.78, frame.y + frame.height * 0.58, 30, 20, 'FINE', finish.ink)
}

function screen(x: number, y: number, width: number, height: number, random: () => number): string {
  const wave = Array.from({ length: 121 }, (_, index) => {
    const along = index / 120
    return `${(x + 18 + (width - 36) * along).toFixed(1)},${(y + height / 2 - Math.sin(along * Math.PI * (4 + random() * 0.02)) * height * 0.3).toFixed(1)}`
  }).join(' ')
  const grid = Array.from({ length: 9 }, (_, index) => stroke(x + width * (index + 1) / 10, y + 10, x + width * (index + 1) / 10, y + height - 10, 'rgb(190 255 210 / .18)', 1.4)).join('')
    + Array.from({ length: 7 }, (_, index) => stroke(x + 10, y + height * (index + 1) / 8, x + width - 10, y + height * (index + 1) / 8, 'rgb(190 255 210 / .18)', 1.4)).join('')
  return rect(x - 16, y - 16, width + 32, height + 32, '#151615', 26) + rect(x, y, width, height, '#0e2a20', 34) + grid
    + `<polyline points="${wave}" fill="none" stroke="#8dffb4" stroke-width="5" opacity=".35"/><polyline points="${wave}" fill="none" stroke="#c9ffdb" stroke-width="2"/>`
}

const scope: Panel = (drawing) => {
  const { frame, random } = drawing
  return screen(frame.x + frame.width * 0.12, frame.y + frame.height * 0.1, frame.width * 0.76, frame.height * 0.42, random)
    + controlRow(drawing, 0.64, ['BRILL', 'FOCUS', 'SHIFT', 'TIME'], 26) + controlRow(drawing, 0.83, ['GAIN', 'STEPS', 'TRIG'], 30, 0.16, 0.66)
    + socket(frame.x + frame.width * 0.88, frame.y + frame.height * 0.85, 19)
}

const bigMeter = (word: string, knobs: readonly string[]): Panel => (drawing) => {
  const { frame, random } = drawing
  return meter(frame.x + frame.width * 0.1, frame.y + frame.height * 0.09, frame.width * 0.8, frame.height * 0.45, random() * 0.7 + 0.1, word)
    + controlRow(drawing, 0.71, knobs, 38, 0.25, 0.75)
    + socket(frame.x + frame.width * 0.2, frame.y + frame.height * 0.92, 17, '#9c2a20') + socket(frame.x + frame.width * 0.5, frame.y + frame.height * 0.92, 17) + socket(frame.x + frame.width * 0.8, frame.y + frame.height * 0.92, 17, '#1c1d1c')
}

const bridge: Panel = (drawing) => {
  const { frame, random } = drawing
  return bigDial(frame.x + frame.width * 0.5, frame.y + frame.height * 0.48, frame.height * 0.29, -100 + 200 * random())
    + meter(frame.x + frame.width * 0.06, frame.y + frame.height * 0.12, frame.width * 0.2, frame.height * 0.24, 0.5, 'NULL')
    + controlRow(drawing, 0.84, ['R C L', 'RANGE', 'SENS'], 32, 0.12, 0.88) + socket(frame.x + frame.width * 0.84, frame.y + frame.height * 0.24, 20, '#9c2a20') + socket(frame.x + frame.width * 0.93, frame.y + frame.height * 0.24, 20, '#1c1d1c')
}

const counter: Panel = (drawing) => {
  const { frame, random } = drawing
  const digits = Array.from({ length: 8 }, (_, index) => lettering(String(Math.floor(random() * 10)), frame.x + frame.width * 0.1 + index * frame.width * 0.062, frame.y + frame.height * 0.4, 74, '#ff9a4a', 0.5)).join('')
  return rect(frame.x + frame.width * 0.05, frame.y + frame.height * 0.14, frame.width * 0.54, frame.height * 0.36, '#1a0f0a', 8) + digits
    + controlRow(drawing, 0.74, ['GATE', 'LEVEL', 'ATTEN', 'FUNCTION'], 28, 0.1, 0.62) + socket(frame.x + frame.width * 0.74, frame.y + frame.height * 0.74, 22)
    + socket(frame.x + frame.width * 0.87, frame.y + frame.height * 0.74, 22) + lamp(frame.x + frame.width * 0.74, frame.y + frame.height * 0.28, '#e0572e') + lamp(frame.x + frame.width * 0.87, frame.y + frame.height * 0.28, '#e8b54a')
}

const supply: Panel = (drawing) => {
  const { frame, random } = drawing
  return meter(frame.x + frame.width * 0.07, frame.y + frame.height * 0.12, frame.width * 0.38, frame.height * 0.4, random() * 0.8, 'VOLTS') + meter(frame.x + frame.width * 0.55, frame.y + frame.height * 0.12, frame.width * 0.38, frame.height * 0.4, random() * 0.5, 'MILLIAMPS')
    + controlRow(drawing, 0.75, ['COARSE', 'FINE', 'LIMIT'], 34, 0.12, 0.56) + ['#9c2a20', '#2f5d50', '#1c1d1c'].map((colour, index) => socket(frame.x + frame.width * (0.72 + index * 0.1), frame.y + frame.height * 0.76, 22, colour)).join('')
}

const valveTester: Panel = (drawing) => {
  const { frame, random } = drawing
  const sockets = Array.from({ length: 10 }, (_, index) => {
    const x = frame.x + frame.width * (0.52 + (index % 5) * 0.095)
    const y = frame.y + frame.height * (0.2 + Math.floor(index / 5) * 0.2)
    const pins = 5 + index % 5
    return disc(x, y, 34, '#1b1c1b') + disc(x, y, 8, '#c9c6bb') + Array.from({ length: pins }, (_each, pin) => {
      const [px, py] = around(x, y, 21, 360 * pin / pins)
      return disc(px, py, 4, '#c9c6bb')
    }).join('')
  }).join('')
  const levers = Array.from({ length: 9 }, (_, index) => {
    const x = frame.x + frame.width * (0.08 + index * 0.105)
    const y = frame.y + frame.height * 0.74
    return rect(x - 5, y - 52, 10, 104, '#1b1c1b', 5) + disc(x, y - 40 + 80 * random(), 15, '#efe6cc') + lettering(String(index + 1), x, y + 84, 22, drawing.finish.ink, 0.5)
  }).join('')
  return meter(frame.x + frame.width * 0.06, frame.y + frame.height * 0.09, frame.width * 0.36, frame.height * 0.4, random(), 'mA / V') + sockets + levers
}

function slideDial(x: number, y: number, width: number, height: number, random: () => number, lit: string): string {
  const rows = [0.25, 0.45, 0.65, 0.85].map(part => Array.from({ length: 40 }, (_, index) => stroke(x + 24 + (width - 48) * index / 39, y + height * part, x + 24 + (width - 48) * index / 39, y + height * part - (index % 5 === 0 ? height * 0.1 : height * 0.06), '#3b3a33', index % 5 === 0 ? 2.4 : 1.3)).join('')).join('')
  const cursor = x + width * (0.15 + 0.7 * random())
  return rect(x - 8, y - 8, width + 16, height + 16, '#171817', 10) + rect(x, y, width, height, lit, 5) + rows + stroke(cursor, y + 6, cursor, y + height - 6, '#9c2a20', 4)
}

const receiver: Panel = (drawing) => {
  const { frame, random } = drawing
  return slideDial(frame.x + frame.width * 0.06, frame.y + frame.height * 0.1, frame.width * 0.6, frame.height * 0.3, random, '#efe0b4') + meter(frame.x + frame.width * 0.72, frame.y + frame.height * 0.08, frame.width * 0.22, frame.height * 0.32, random() * 0.6, 'SIGNAL')
    + labelledKnob(frame.x + frame.width * 0.36, frame.y + frame.height * 0.68, 74, 40 * random(), 'TUNING', drawing.finish.ink) + controlRow(drawing, 0.62, ['RF GAIN', 'AF GAIN', 'BFO'], 28, 0.56, 0.92)
    + controlRow(drawing, 0.86, ['BAND', 'SELECT', 'AVC'], 24, 0.56, 0.92) + labelledKnob(frame.x + frame.width * 0.13, frame.y + frame.height * 0.68, 38, -60, 'BAND', drawing.finish.ink)
}

const domestic: Panel = ({ frame, random }) => {
  const cloth = Array.from({ length: 46 }, (_, index) => stroke(frame.x + 60 + index * 9, frame.y + 60, frame.x + 60 + index * 9, frame.y + frame.height - 170, index % 2 ? '#a58a5d' : '#8b7148', 5)).join('')
  return rect(frame.x + 20, frame.y + 20, frame.width - 40, frame.height - 40, '#6d4426', 22) + cloth + slideDial(frame.x + 510, frame.y + 66, frame.width - 570, frame.height - 240, random, '#f0dca4')
    + knob(frame.x + 150, frame.y + frame.height - 88, 44, 60, '#2c1a10') + knob(frame.x + 320, frame.y + frame.height - 88, 44, -30, '#2c1a10') + knob(frame.x + frame.width - 320, frame.y + frame.height - 88, 44, 10, '#2c1a10') + knob(frame.x + frame.width - 150, frame.y + frame.height - 88, 44, 80, '#2c1a10')
}

const tuner: Panel = (drawing) => {
  const { frame, random } = drawing
  return slideDial(frame.x + frame.width * 0.06, frame.y + frame.height * 0.16, frame.width * 0.66, frame.height * 0.34, random, '#9fd0c4') + meter(frame.x + frame.width * 0.77, frame.y + frame.height * 0.13, frame.width * 0.17, frame.height * 0.4, random(), 'TUNE')
    + controlRow(drawing, 0.74, ['POWER', 'BAND', 'MUTE'], 26, 0.08, 0.4) + knob(frame.x + frame.width * 0.84, frame.y + frame.height * 0.76, 44, 30, '#c9c6bb') + lamp(frame.x + frame.width * 0.62, frame.y + frame.height * 0.74, '#e0572e')
}

const amplifier: Panel = drawing => controlRow(drawing, 0.52, ['INPUT', 'BASS', 'TREBLE', 'BALANCE', 'VOLUME'], 44, 0.12, 0.88) + lamp(drawing.frame.x + drawing.frame.width * 0.06, drawing.frame.y + drawing.frame.height * 0.2, '#e8b54a')

const transceiver: Panel = (drawing) => {
  const { frame, random } = drawing
  return rect(frame.x + frame.width * 0.3, frame.y + frame.height * 0.16, frame.width * 0.34, frame.height * 0.3, '#150d0a', 6) + lettering(`${144 + Math.floor(random() * 2)}.${Math.floor(100 + random() * 800)}`, frame.x + frame.width * 0.47, frame.y + frame.height * 0.39, 54, '#ff7d4a', 0.5)
    + meter(frame.x + frame.width * 0.05, frame.y + frame.height * 0.12, frame.width * 0.19, frame.height * 0.4, random() * 0.5, 'S · RF') + labelledKnob(frame.x + frame.width * 0.82, frame.y + frame.height * 0.38, 54, 30, 'CHANNEL', drawing.finish.ink)
    + controlRow(drawing, 0.74, ['VOLUME', 'SQUELCH', 'POWER'], 24, 0.28, 0.6) + socket(frame.x + frame.width * 0.12, frame.y + frame.height * 0.76, 24)
}

const PANELS: Record<EquipmentKind, Panel> = {
  rf_generator: generator, sweep_generator: generator, stereo_generator: tuner, audio_oscillator: bridge, oscilloscope: scope,
  voltmeter: bigMeter('VOLTS', ['RANGE', 'ZERO']), multimeter: bigMeter('V · A · R', ['RANGE']), bridge, counter, power_supply: supply, valve_tester: valveTester,
  communications_receiver: receiver, domestic_receiver: domestic, tuner, amplifier, transceiver, other: supply,
}

/** The case and panel of a piece from the front. */
export function frontPanel(kind: EquipmentKind, finish: Finish, maker: string, designation: string, random: () => number): string {
  const frame = FRAMES[kind]
  const isWood = kind === 'domestic_receiver'
  const { x, y, width, height } = frame
  const corners: readonly [number, number][] = [[22, 22], [width - 22, 22], [22, height - 22], [width - 22, height - 22]]
  return rect(x + 12, y + height - 8, width - 24, 34, 'rgb(0 0 0 / .35)', 16) + rect(x - 16, y - 16, width + 32, height + 32, isWood ? '#55331b' : finish.case, isWood ? 40 : 14)
    + rect(x, y, width, height, isWood ? '#7a4d2b' : finish.panel, isWood ? 28 : 6) + PANELS[kind]({ frame, finish, random })
    + (isWood
      ? lettering(maker.toUpperCase(), x + width * 0.5, y + height - 80, 24, '#e8cf9a', 0.5)
      : corners.map(([dx, dy]) => screw(x + dx, y + dy, random() * 180)).join('')
        + lettering(`${maker.toUpperCase()}   ${designation}`, x + width / 2, y + 30, 20, finish.ink, 0.5))
      + rect(x - 16, y - 16, width + 32, height + 32, 'url(#sheen)', isWood ? 40 : 14)
}
