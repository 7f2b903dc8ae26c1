import sharp from 'sharp'
import type { EquipmentKind } from '../../../shared/domain/equipment-kinds'
import type { PhotoSubject } from '../../../shared/domain/photos'
import type { Finish } from './panels'
import { FINISHES, frameOf, frontPanel } from './panels'
import { disc, lettering, rect, scene, screw, seeded, socket, stroke } from './primitives'

/** What a picture is drawn from: an invented piece. */
export interface Piece { kind: EquipmentKind, maker: string, designation: string, serial: string, supply: string, seed: string }

function rear({ kind, supply }: Piece, finish: Finish, random: () => number): string {
  const { x, y, width, height } = frameOf(kind)
  const vents = Array.from({ length: 9 }, (_, index) => rect(x + width * 0.08 + index * width * 0.055, y + height * 0.16, width * 0.03, height * 0.3, '#161716', 8)).join('')
  const lead = `<path d="M ${x + width * 0.82} ${y + height * 0.78} q 90 10 110 130 t 120 120" fill="none" stroke="#141514" stroke-width="20" stroke-linecap="round"/>`
  return rect(x - 12, y + height - 4, width + 24, 30, 'rgb(0 0 0 / .35)', 16) + rect(x - 10, y - 10, width + 20, height + 20, finish.case, 12) + vents
    + [0.1, 0.22, 0.34].map(part => socket(x + width * part, y + height * 0.78, 24)).join('') + rect(x + width * 0.6, y + height * 0.14, width * 0.3, height * 0.28, '#d9d2bb', 4)
    + lettering(supply.slice(0, 26), x + width * 0.75, y + height * 0.3, 20, '#2a2a26', 0.5) + disc(x + width * 0.82, y + height * 0.78, 26, '#0f100f') + lead
    + disc(x + width * 0.56, y + height * 0.78, 26, '#0f100f') + lettering('FUSE', x + width * 0.56, y + height * 0.78 + 58, 18, '#e9e3d0', 0.5) + screw(x + 20, y + 20, random() * 180) + screw(x + width - 20, y + 20, random() * 180)
}

function inside({ kind }: Piece, random: () => number): string {
  const { x, y, width, height } = frameOf(kind)
  const parts = Array.from({ length: 26 }, (_, index) => {
    const px = x + 60 + random() * (width - 120)
    const py = y + 70 + random() * (height - 140)
    if (index % 4 === 0) return disc(px, py, 36, '#3a3f44') + disc(px, py, 30, 'rgb(200 220 230 / .35)') + disc(px, py, 12, '#8a3a22')
    if (index % 4 === 1) return rect(px - 40, py - 13, 80, 26, '#b9904e', 9) + stroke(px - 60, py, px + 60, py, '#c9c6bb', 3)
    if (index % 4 === 2) return rect(px - 24, py - 7, 48, 14, '#9b7f63', 6) + ['#9c2a20', '#1b1b1a', '#c98b2d'].map((band, at) => rect(px - 14 + at * 11, py - 7, 5, 14, band)).join('')
    return rect(px - 30, py - 42, 60, 84, '#8b8f92', 6) + rect(px - 30, py - 42, 60, 18, '#6e7275', 6)
  }).join('')
  const wires = Array.from({ length: 18 }, () => `<path d="M ${x + random() * width} ${y + random() * height} C ${x + random() * width} ${y + random() * height} ${x + random() * width} ${y + random() * height} ${x + random() * width} ${y + random() * height}" fill="none" stroke="${['#9c2a20', '#c9a23a', '#2f5d50', '#3a5b8a', '#1b1b1a'][Math.floor(random() * 5)]}" stroke-width="5" opacity=".85"/>`).join('')
  return rect(x, y, width, height, '#a7aaa8', 8) + wires + parts
}

function plate({ maker, designation, serial, supply }: Piece): string {
  return rect(190, 230, 900, 500, '#2b2c2b', 10) + rect(230, 270, 820, 420, '#cbbd95', 12) + rect(244, 284, 792, 392, 'none', 8, 'stroke="#5d4b25" stroke-width="4"')
    + [[270, 310], [1010, 310], [270, 650], [1010, 650]].map(([x = 0, y = 0], index) => screw(x, y, index * 40)).join('')
    + lettering(maker.toUpperCase(), 640, 380, 62, '#2a2312', 0.5) + lettering(`TYPE ${designation}`, 640, 470, 50, '#2a2312', 0.5) + lettering(`SERIAL ${serial}`, 640, 550, 50, '#2a2312', 0.5) + lettering(supply, 640, 625, 32, '#2a2312', 0.5)
}

const packing = (random: () => number) => rect(250, 260, 780, 520, '#b58a55', 6) + rect(250, 260, 780, 120, '#c79c66', 6) + rect(610, 260, 60, 520, '#d8c08f')
  + Array.from({ length: 60 }, () => disc(290 + random() * 700, 250 - random() * 60, 22 + random() * 14, 'rgb(240 238 230 / .9)', 'stroke="#d5d0c2" stroke-width="2"')).join('')

/** A picture of the piece as JPEG, 1280 × 960. */
export async function drawPhoto(piece: Piece, subject: PhotoSubject): Promise<Buffer> {
  const random = seeded(`${piece.seed}/${subject}`)
  const look = seeded(piece.seed)
  const finish = FINISHES[Math.floor(look() * FINISHES.length)] ?? { case: '#3d4440', panel: '#6d7771', ink: '#f1ede0' }
  const content = subject === 'rear'
    ? rear(piece, finish, random)
    : subject === 'inside' || subject === 'before' || subject === 'after'
      ? inside(piece, random)
      : subject === 'plate'
        ? plate(piece)
        : subject === 'packing'
          ? packing(random)
          : frontPanel(piece.kind, finish, piece.maker, piece.designation, look)
  return sharp(Buffer.from(scene(content))).jpeg({ quality: 84 }).toBuffer()
}
