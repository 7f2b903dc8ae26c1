/**
 * What the records already say about each thing a buyer must be told. Only offered: a person takes it over, changes it
 * or writes their own, and only what they save is said.
 */
import type { ProvenanceSheet } from '../types/provenance'
import type { DisclosureKey } from './disclosures'
import { factInWords } from './knowledge'
import { tallyInWords, tallyOf } from './sheet-tally'

/** For each topic the words the record supports, or an empty string where it holds nothing. */
export function hintsFromRecord(sheet: ProvenanceSheet, defaultTerms: string): Partial<Record<DisclosureKey, string>> {
  return {
    identity: `${sheet.maker} ${sheet.designation}, ${lower(sheet.kind)}${sheet.years ? `, made ${sheet.years}` : ''}. Serial ${factInWords(sheet.serial.answer, sheet.serial.text)}.`,
    working_state: sheet.notEnergised ?? '',
    tests: testsInWords(sheet),
    changes: changesInWords(sheet),
    safety: safetyInWords(sheet),
    supply: sheet.supply === 'not known' ? '' : capital(sheet.supply),
    included: sheet.keptWith.filter(item => item.missing === null).map(item => item.description).join('; '),
    missing: sheet.keptWith.filter(item => item.missing !== null).map(item => item.description).join('; '),
    terms: defaultTerms,
  }
}

function testsInWords(sheet: ProvenanceSheet): string {
  const latest = sheet.sheets[0]
  if (!latest) return ''
  const readings = latest.readings.length > 0 ? capital(tallyInWords(tallyOf(latest.readings))) : ''
  const failed = latest.checks.filter(check => check.result === 'Fail').map(check => check.name)
  const passed = latest.checks.filter(check => check.result === 'Pass').length
  const checks = latest.checks.length > 0 ? `${passed} of ${latest.checks.length} checks passed${failed.length ? `; failed: ${failed.join(', ')}` : ''}` : ''
  const by = latest.instruments.length > 0 ? `Measured with ${latest.instruments.join(', ')}.` : 'The instrument used is not recorded.'
  const name = `Test sheet ${latest.number} of ${latest.testedOn}`
  const found = [`${[readings, checks].filter(Boolean).join('; ')}.`, by, ...latest.instrumentWarnings].join(' ')
  // What a buyer reads first must not be how it measured, when something was done to it since.
  return latest.staleBecause ? `${name} was overtaken by later work. ${latest.staleBecause} Before that work: ${found}` : `${name}: ${found}`
}

function changesInWords(sheet: ProvenanceSheet): string {
  const count = (hand: string) => sheet.work.filter(entry => entry.hand === hand).length
  const parts = [
    count('done_by_us') && `${count('done_by_us')} done by us`,
    count('found_like_this') && `${count('found_like_this')} found from an earlier hand`,
    count('left_alone') && `${count('left_alone')} deliberately left alone`,
  ].filter(Boolean)
  return parts.length > 0 ? `The work log lists ${parts.join(', ')}.` : 'No changes seen or made; the work log is empty.'
}

function safetyInWords(sheet: ProvenanceSheet): string {
  const hazards = sheet.hazards.length > 0 ? ` Hazards noted: ${sheet.hazards.map(hazard => lower(hazard.label)).join(', ')}.` : ''
  if (!sheet.safety) return hazards.trim()
  const verdict = sheet.safety.passed ? 'passed' : 'failed'
  return `Electrical safety check of ${sheet.safety.doneAt.slice(0, 10)} ${verdict}${sheet.safety.current ? '' : ', before later work'}. ${sheet.safety.lines.slice(0, 4).join('. ')}.${hazards}`
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}

/** Lower case, but not where the word is an abbreviation. */
function lower(text: string): string {
  return /^[A-Z]{2}/.test(text) ? text : text.charAt(0).toLowerCase() + text.slice(1)
}
