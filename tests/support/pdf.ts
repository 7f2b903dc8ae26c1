import { execFileSync } from 'node:child_process'

/** The words of a PDF in one line, as a person reads them: line breaks and narrow spaces are plain spaces. */
export function readPdfText(pdf: Buffer): string {
  return execFileSync('pdftotext', ['-enc', 'UTF-8', '-', '-'], { input: pdf, encoding: 'utf8' }).replaceAll('\u202F', ' ').replace(/\s+/g, ' ')
}
