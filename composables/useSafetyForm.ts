import { formatKilohm, formatMicroamp, formatMilliohm, judgeSafety, suggestLimits } from '#shared/domain/safety-check'
import { storedChargeInWords } from '#shared/domain/stored-charge'
import type { CheckResult } from '#shared/domain/sheet-checks'
import type { SafetyClass } from '#shared/domain/triage'
import { newSafetyCheck } from '#shared/schemas/safety-check'
import type { SafetyFormView } from '#shared/types/bench'

/** A safety check as it is typed. */
export interface SafetyAnswers {
  safetyClass: SafetyClass | ''
  earthBond: string
  insulation: string
  insulationTestVolts: string
  leakage: string
  leadAndPlug: CheckResult | ''
  fuse: CheckResult | ''
  polarity: CheckResult | ''
  visual: CheckResult | ''
  fuseRating: string
  reservoirMicrofarad: string
  bleederKilohm: string
  reservoirVolts: string
  earthBondLimit: string
  insulationLimit: string
  leakageLimit: string
  limitsOrigin: string
  note: string
  instrumentId: string
}

type Typed = 'earthBond' | 'insulation' | 'leakage' | 'reservoirMicrofarad' | 'bleederKilohm' | 'reservoirVolts' | 'earthBondLimit' | 'insulationLimit' | 'leakageLimit'

/** The answers of a safety check, judged as they are typed by the rule that the server keeps. */
export function useSafetyForm(form: SafetyFormView) {
  const answers = reactive<SafetyAnswers>({
    safetyClass: form.safetyClass ?? '', earthBond: '', insulation: '', insulationTestVolts: '500', leakage: '',
    leadAndPlug: '', fuse: '', polarity: '', visual: '', earthBondLimit: '', insulationLimit: '', leakageLimit: '', limitsOrigin: '',
    note: '', instrumentId: '', fuseRating: form.fuseRating, reservoirMicrofarad: '', bleederKilohm: '', reservoirVolts: '',
  })
  const isEarthed = computed(() => answers.safetyClass === 'earthed')
  /** What was typed, in the unit it is kept in; null while empty or not to be read. */
  const typed = (field: Typed) => {
    const parsed = newSafetyCheck.shape[field].safeParse(answers[field])
    return parsed.success ? parsed.data : null
  }
  const suggested = computed(() => suggestLimits(answers.safetyClass || 'not_known', form.limits, form.limitsOrigin))
  const limits = computed(() => ({
    earthBondMilliohm: typed('earthBondLimit') ?? suggested.value.limits.earthBondMilliohm,
    insulationKilohm: typed('insulationLimit') ?? suggested.value.limits.insulationKilohm,
    leakageMicroamp: typed('leakageLimit') ?? suggested.value.limits.leakageMicroamp,
  }))
  const inWords = computed(() => ({
    earthBond: formatMilliohm(limits.value.earthBondMilliohm),
    insulation: formatKilohm(limits.value.insulationKilohm),
    leakage: formatMicroamp(limits.value.leakageMicroamp),
    origin: answers.limitsOrigin.trim() || suggested.value.origin,
  }))
  const judgement = computed(() => judgeSafety({
    safetyClass: answers.safetyClass || 'not_known',
    earthBondMilliohm: isEarthed.value ? typed('earthBond') : null,
    insulationKilohm: typed('insulation'),
    leakageMicroamp: typed('leakage'),
    leadAndPlug: answers.leadAndPlug || 'not_done',
    fuse: answers.fuse || 'not_done',
    polarity: answers.polarity || 'not_done',
    visual: answers.visual || 'not_done',
  }, limits.value))
  /** How long the stored charge stays, as soon as enough is typed. */
  const charge = computed(() => storedChargeInWords({
    reservoirMicrofarad: typed('reservoirMicrofarad'), bleederKilohm: typed('bleederKilohm'), reservoirVolts: typed('reservoirVolts'),
  }))
  /** What is sent: an earth bond typed before the class was changed stays on the form, but is not sent. */
  const body = () => ({ ...answers, earthBond: isEarthed.value ? answers.earthBond : '' })
  return { answers, isEarthed, inWords, judgement, charge, body }
}
