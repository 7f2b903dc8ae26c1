/**
 * What a safety check says of the charge that a supply's reservoir capacitor keeps. The time is `capacitor-discharge`'s.
 *
 * Sources: IEC 61010-1 6.10.3 asks 5 s after a plug is pulled that its pins are not hazardous live, by a charge of about
 * 45 µC (a product-safety engineers' list); 60 V DC is what its 3rd ed. (2010) takes as not hazardous in normal condition
 * (clause FROM MEMORY), and as a test of the plug only a shortcut.
 */
import { CHARGE_LIMIT_MICROCOULOMB, dischargeTime, USUAL_VOLTS } from './capacitor-discharge'
import { NARROW_SPACE } from './frequency'

/** Said wherever a stored charge is spoken of. */
export const DISCHARGE_CAUTION = 'Discharge it through a resistor and check with a meter that it is dead before a hand goes in, whatever is worked out here: a bleeder may be open, and a capacitor recovers some of its charge.'

export const PLUG_TEST_NOTE = `IEC 61010-1 tests the pins of the plug, 5${NARROW_SPACE}s after it is pulled, by the charge they can still give (about ${CHARGE_LIMIT_MICROCOULOMB}${NARROW_SPACE}µC), not by a voltage. ${USUAL_VOLTS}${NARROW_SPACE}V DC is the usual shortcut.`

/** The reservoir capacitor, what stands on it in work and the resistor across it; null: not said. */
export interface StoredCharge { reservoirMicrofarad: number | null, reservoirVolts: number | null, bleederKilohm: number | null }

/**
 * How long a reservoir capacitor takes to fall to 60 V once power is off, in words; null until the capacitor and its voltage
 * are said. Without a bleeder no time is given: nothing is known to empty it.
 */
export function storedChargeInWords({ reservoirMicrofarad, reservoirVolts, bleederKilohm }: StoredCharge): string | null {
  if (reservoirMicrofarad === null || reservoirVolts === null) return null
  const { sentence } = dischargeTime({
    volts: reservoirVolts, farad: reservoirMicrofarad / 1e6, bleederOhm: bleederKilohm === null ? null : bleederKilohm * 1000,
  })
  const bleeder = bleederKilohm === null ? 'no bleeder entered' : `bleeder ${bleederKilohm}${NARROW_SPACE}kΩ`
  return `${reservoirMicrofarad}${NARROW_SPACE}µF at ${reservoirVolts}${NARROW_SPACE}V, ${bleeder}. ${sentence}`
}
