import { describe, expect, it } from 'vitest'
import { toFieldErrors } from '../../../../shared/schemas/field-errors'
import { newSafetyCheck } from '../../../../shared/schemas/safety-check'

const typed = {
  safetyClass: 'earthed', earthBond: '0.06', insulation: '20', insulationTestVolts: '500', leakage: '0.4',
  leadAndPlug: 'pass', fuse: 'pass', polarity: 'pass', visual: 'pass', instrumentId: '6f1e0f5e-58f5-4f0b-8b0c-2f4f3f0e8f11',
}
const read = (values: object) => newSafetyCheck.safeParse({ ...typed, ...values })
const errors = (values: object) => {
  const parsed = read(values)
  return parsed.success ? [] : toFieldErrors(parsed.error)
}

describe('newSafetyCheck', () => {
  it('reads bare numbers in the unit beside the box', () => {
    expect(read({}).data).toMatchObject({ earthBond: 60, insulation: 20_000, insulationTestVolts: 500, leakage: 400 })
  })

  it.each([
    ['earthBond', '80 mohm', 80], ['earthBond', '0.0601 ohm', 61], ['insulation', '470 k', 470], ['insulation', '> 200 M', 200_000],
    ['insulation', '1.0009 M', 1000], ['leakage', '250 uA', 250], ['leakage', '3.5 mA', 3500], ['leakage', '', null],
  ])('reads %s as "%s", on the worse side where it is not exact', (field, text, kept) => {
    expect(read({ [field]: text }).data).toMatchObject({ [field]: kept })
  })

  it.each([
    ['reservoirMicrofarad', '32', 32], ['reservoirMicrofarad', '47 nF', 0.047], ['reservoirMicrofarad', '', null], ['reservoirMicrofarad', '0.00001', 0.0001],
    ['bleederKilohm', '220', 220], ['bleederKilohm', '1 M', 1000], ['bleederKilohm', '470 ohm', 0.47], ['bleederKilohm', '', null],
    ['reservoirVolts', '350', 350], ['reservoirVolts', '5.1 kV', 5100], ['reservoirVolts', '62.5', 63], ['reservoirVolts', '', null],
    ['fuseRating', ' T 500 mA ', 'T 500 mA'],
  ])('reads %s as "%s", on the side on which the charge stays longer', (field, text, kept) => {
    expect(read({ [field]: text }).data).toMatchObject({ [field]: kept })
  })

  it('asks nothing of the stored charge, and needs no instrument for it', () => {
    expect(read({}).data).toMatchObject({ fuseRating: '', reservoirMicrofarad: null, bleederKilohm: null, reservoirVolts: null })
    expect(errors({ earthBond: '', insulation: '', leakage: '', instrumentId: '', reservoirMicrofarad: '32', reservoirVolts: '350' })).toEqual([])
  })

  it.each([
    [{ reservoirMicrofarad: '0' }, 'reservoirMicrofarad'], [{ bleederKilohm: '0' }, 'bleederKilohm'], [{ bleederKilohm: '220 V' }, 'bleederKilohm'],
    [{ reservoirVolts: '-350' }, 'reservoirVolts'], [{ reservoirVolts: '200 kV' }, 'reservoirVolts'], [{ reservoirMicrofarad: '100 F' }, 'reservoirMicrofarad'],
    [{ earthBond: 'banana' }, 'earthBond'], [{ leakage: '-1' }, 'leakage'], [{ insulation: '20 V' }, 'insulation'],
    [{ safetyClass: 'double_insulated' }, 'earthBond'], [{ insulationTestVolts: '' }, 'insulationTestVolts'],
    [{ instrumentId: '' }, 'instrumentId'], [{ leakageLimit: '5' }, 'limitsOrigin'], [{ leakageLimit: '0', limitsOrigin: 'x' }, 'leakageLimit'],
    [{ visual: 'fine' }, 'visual'],
  ])('refuses %o at its own field', (values, path) => {
    expect(errors(values).map(error => error.path)).toEqual([path])
  })
})
