import { writeFile } from 'node:fs/promises'
import type { GreyImage } from './raster'

/** The picture in the middle of a camera's view, on a grey wall. */
function framed(image: GreyImage, width: number, height: number): Buffer {
  const frame = Buffer.alloc(width * height, 150)
  const scale = Math.min(width * 0.9 / image.width, height * 0.9 / image.height)
  const [wide, high] = [Math.floor(image.width * scale), Math.floor(image.height * scale)]
  const [left, top] = [Math.floor((width - wide) / 2), Math.floor((height - high) / 2)]
  for (let y = 0; y < high; y++) {
    for (let x = 0; x < wide; x++) {
      frame[(top + y) * width + left + x] = image.data[Math.floor(y / scale) * image.width + Math.floor(x / scale)] ?? 255
    }
  }
  return frame
}

/** Writes a film of one picture that Chromium can show as what its camera sees (YUV4MPEG2, 4:2:0). */
export async function writeCameraFilm(file: string, image: GreyImage, size = { width: 1280, height: 720 }): Promise<void> {
  const { width, height } = size
  const frame = Buffer.concat([Buffer.from('FRAME\n'), framed(image, width, height), Buffer.alloc(width * height / 2, 128)])
  await writeFile(file, Buffer.concat([Buffer.from(`YUV4MPEG2 W${width} H${height} F10:1 Ip A1:1 C420jpeg\n`), frame, frame, frame]))
}
