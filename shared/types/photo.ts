import type { PhotoSubject } from '../domain/photos'

/** Addresses of one picture at its made widths: `srcset` for `<img>`, smallest first. */
export interface PhotoView {
  id: string
  subject: PhotoSubject
  caption: string
  width: number
  height: number
  /** 320 px wide, and the largest. */
  thumbnailUrl: string
  url: string
  /** `<url> 320w, <url> 800w…` as WebP, and as AVIF once made (else null). */
  webpSrcset: string
  avifSrcset: string | null
  modificationId: string | null
  isPublic: boolean
  /** Its place among the photos of the same subject. */
  position: number
  version: number
}

export interface DocumentView { id: string, title: string, name: string, byteSize: number, url: string, isPublic: boolean }
