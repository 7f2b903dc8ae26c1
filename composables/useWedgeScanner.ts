import { readScannedText } from '#shared/domain/tag'
import type { WedgeKey } from '#shared/domain/wedge'
import { stepWedge, WEDGE_IDLE } from '#shared/domain/wedge'

type ScanHandler = (text: string) => void

/** Pages that take scans for themselves while they are open, the newest last; browser only. */
const takers: ScanHandler[] = []

/** Takes what a hand scanner types for as long as the calling component lives, instead of opening the record. */
export function useScanTaker(handler: ScanHandler): void {
  onMounted(() => takers.push(handler))
  onBeforeUnmount(() => {
    const at = takers.lastIndexOf(handler)
    if (at >= 0) takers.splice(at, 1)
  })
}

/** What a form element held before a scan was typed into it. */
interface Snapshot { element: Element | null, restore: () => void }

/** Only text fields can be typed into; a list changes its choice by typing. */
function takeSnapshot(element: Element | null): Snapshot {
  if (element instanceof HTMLInputElement || element instanceof HTMLTextAreaElement) {
    const { value } = element
    return { element, restore: () => setValue(element, value) }
  }
  if (element instanceof HTMLSelectElement) {
    const { value } = element
    return {
      element,
      restore: () => {
        if (element.value === value) return
        element.value = value
        element.dispatchEvent(new Event('input', { bubbles: true }))
        element.dispatchEvent(new Event('change', { bubbles: true }))
      },
    }
  }
  return { element, restore: () => {} }
}

function setValue(field: HTMLInputElement | HTMLTextAreaElement, value: string): void {
  if (field.value === value) return
  field.value = value
  field.dispatchEvent(new Event('input', { bubbles: true }))
}

function readKey(event: KeyboardEvent): WedgeKey {
  const at = event.timeStamp
  if (event.isComposing || event.ctrlKey || event.metaKey || event.altKey) return { kind: 'other', at }
  if (event.key === 'Enter') return { kind: 'enter', at }
  if (['Shift', 'CapsLock', 'AltGraph'].includes(event.key)) return { kind: 'modifier', at }
  return Array.from(event.key).length === 1 ? { kind: 'character', character: event.key, at } : { kind: 'other', at }
}

/**
 * Listens for a hand scanner on every page. A fast burst that ends in Enter and reads as a tag or as a label's address
 * never stays in a field: the field gets back what it held, and the Enter sends no form. Anything else a scanner types
 * (a maker's own code into the serial's box) is left where it went.
 */
export function listenForWedge(isWanted: () => boolean, open: ScanHandler): void {
  let state = WEDGE_IDLE
  let before = takeSnapshot(null)
  window.addEventListener('keydown', (event) => {
    if (!isWanted()) return
    const { activeElement } = document
    const step = stepWedge(state, readKey(event))
    state = step.state
    if (step.begins) before = takeSnapshot(activeElement)
    if (step.burst === null || before.element !== activeElement) return
    const read = readScannedText(step.burst)
    if (!read.ok && read.reason === 'not-a-tag') return
    event.preventDefault()
    event.stopImmediatePropagation()
    before.restore()
    const taker = takers.at(-1) ?? open
    taker(step.burst)
  }, { capture: true })
}
