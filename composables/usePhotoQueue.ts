import type { PhotoSubject } from '#shared/domain/photos'
import type { PhotoView } from '#shared/types/photo'
import { MAX_PHOTO_BYTES } from '#shared/domain/photo-sizes'

export interface QueuedPhoto {
  key: number
  file: File
  /** An address for showing it before it is sent. */
  preview: string
  subject: PhotoSubject
  state: 'waiting' | 'sending' | 'sent' | 'refused'
  problem: string
}

/** In which order a piece is usually photographed at the doorway. */
const ROUND: readonly PhotoSubject[] = ['packing', 'front', 'plate', 'left', 'rear', 'right', 'top', 'underneath', 'kit', 'detail']

/** Photos taken before the piece has a tag: they wait in this tab and are sent once it has one. */
export function usePhotoQueue(round: readonly PhotoSubject[] = ROUND) {
  const photos = ref<QueuedPhoto[]>([])
  let last = 0

  function add(files: Iterable<File>) {
    for (const file of files) {
      const taken = new Set(photos.value.map(photo => photo.subject))
      const isTooLarge = file.size > MAX_PHOTO_BYTES
      photos.value.push({
        key: ++last, file, preview: URL.createObjectURL(file), subject: round.find(subject => !taken.has(subject)) ?? round.at(-1) ?? 'detail',
        state: isTooLarge ? 'refused' : 'waiting', problem: isTooLarge ? `Larger than ${MAX_PHOTO_BYTES / 1e6} MB, so it can’t be sent` : '',
      })
    }
  }
  function remove(key: number) {
    const gone = photos.value.find(photo => photo.key === key)
    if (gone) URL.revokeObjectURL(gone.preview)
    photos.value = photos.value.filter(photo => photo.key !== key)
  }
  function clear() {
    for (const photo of photos.value) URL.revokeObjectURL(photo.preview)
    photos.value = []
  }
  onBeforeUnmount(clear)

  async function send(tag: string, photo: QueuedPhoto, modificationId: string) {
    const body = new FormData()
    body.set('subject', photo.subject)
    if (modificationId) body.set('modificationId', modificationId)
    body.set('file', photo.file)
    photo.state = 'sending'
    try {
      await $fetch<PhotoView>(`/api/units/${tag}/photos`, { method: 'POST', body })
      photo.state = 'sent'
      photo.problem = ''
    } catch (error) {
      photo.state = 'refused'
      photo.problem = problemOf(error)?.detail ?? 'The shop’s server could not be reached'
    }
  }
  /** Sends what is not sent yet, one after another; what is refused stays, with the reason. */
  async function upload(tag: string, modificationId = '') {
    for (const photo of photos.value) {
      if (photo.state !== 'sent' && photo.file.size <= MAX_PHOTO_BYTES) await send(tag, photo, modificationId)
    }
  }
  const areAllSent = computed(() => photos.value.every(photo => photo.state === 'sent'))
  return { photos, areAllSent, add, remove, clear, upload }
}
