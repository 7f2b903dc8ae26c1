import type { SeenCode } from './useCodeDecoder'

/** Why there is no picture. */
export type CameraTrouble = 'insecure' | 'none' | 'refused' | 'busy' | 'decoder'
export type CameraState = 'off' | 'starting' | 'on' | CameraTrouble

/** Wider pictures are read no better and much slower. */
const PICTURE_WIDTH = 960
/** Between two looks, ms. */
const PAUSE = 90

function troubleOf(error: unknown): CameraTrouble {
  const name = error instanceof DOMException ? error.name : ''
  if (name === 'NotAllowedError' || name === 'SecurityError') return 'refused'
  if (name === 'NotFoundError' || name === 'OverconstrainedError') return 'none'
  return name === 'NotReadableError' || name === 'AbortError' ? 'busy' : 'decoder'
}

/**
 * The back camera of the phone, read for codes as long as the calling component lives. `onCodes` gets all that one
 * picture shows, nearest the middle first; the next picture is looked at when its promise has settled.
 */
export function useCamera(video: Readonly<Ref<HTMLVideoElement | null>>, onCodes: (codes: SeenCode[]) => Promise<void>) {
  const state = ref<CameraState>('off')
  const hasTorch = ref(false)
  const torchOn = ref(false)
  let stream: MediaStream | undefined
  /** Each start has a number, so that an earlier loop ends when a later one begins or the page is left. */
  let run = 0

  function stop() {
    run++
    for (const track of stream?.getTracks() ?? []) track.stop()
    stream = undefined
    hasTorch.value = false
    torchOn.value = false
    state.value = 'off'
  }

  async function start() {
    stop()
    const mine = run
    if (!globalThis.isSecureContext) return void (state.value = 'insecure')
    if (!('mediaDevices' in navigator)) return void (state.value = 'none')
    state.value = 'starting'
    try {
      const opened = await navigator.mediaDevices.getUserMedia({ audio: false, video: { facingMode: 'environment', width: { ideal: 1280 }, height: { ideal: 720 } } })
      if (mine !== run || !video.value) return opened.getTracks().forEach(track => track.stop())
      stream = opened
      video.value.srcObject = opened
      await video.value.play()
      const [track] = opened.getVideoTracks()
      hasTorch.value = track !== undefined && 'torch' in (track.getCapabilities?.() ?? {})
      const decode = await loadCodeDecoder()
      if (mine !== run) return
      state.value = 'on'
      await watchPictures(mine, video.value, decode)
    } catch (error) {
      if (mine !== run) return
      stop()
      state.value = troubleOf(error)
    }
  }

  async function watchPictures(mine: number, from: HTMLVideoElement, decode: (picture: ImageData) => Promise<SeenCode[]>) {
    const canvas = document.createElement('canvas')
    const pen = canvas.getContext('2d', { willReadFrequently: true })
    if (!pen) throw new Error('This browser gives no drawing surface')
    while (mine === run) {
      if (from.videoWidth > 0 && document.visibilityState === 'visible') {
        canvas.width = Math.min(from.videoWidth, PICTURE_WIDTH)
        canvas.height = Math.round(canvas.width * from.videoHeight / from.videoWidth)
        pen.drawImage(from, 0, 0, canvas.width, canvas.height)
        const codes = await decode(pen.getImageData(0, 0, canvas.width, canvas.height))
        if (codes.length > 0 && mine === run) await onCodes(codes.sort((a, b) => fromMiddle(a) - fromMiddle(b)))
      }
      await new Promise(resolve => setTimeout(resolve, PAUSE))
    }
  }

  async function toggleTorch() {
    const [track] = stream?.getVideoTracks() ?? []
    const wanted = !torchOn.value
    try {
      // Not in the standard's own types: an extension of Media Capture for photo cameras.
      const light: MediaTrackConstraintSet & { torch: boolean } = { torch: wanted }
      await track?.applyConstraints({ advanced: [light] })
      torchOn.value = wanted
    } catch {
      hasTorch.value = false
    }
  }

  onBeforeUnmount(stop)
  return { state: readonly(state), hasTorch: readonly(hasTorch), torchOn: readonly(torchOn), start, stop, toggleTorch }
}

const fromMiddle = ({ x, y }: SeenCode) => Math.hypot(x - 0.5, y - 0.5)
