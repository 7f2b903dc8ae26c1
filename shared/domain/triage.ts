/**
 * The safety look before any power: a gate, not a note. Cautions are the usual ones of the trade
 * (common practice; see the naval electronics training texts on stored charge); local codes and
 * licensed practice decide.
 */
export const SAFETY_CLASSES = ['earthed', 'double_insulated', 'live_chassis', 'low_voltage', 'not_known'] as const
export type SafetyClass = (typeof SAFETY_CLASSES)[number]
export const SAFETY_CLASS_LABELS: Record<SafetyClass, string> = {
  earthed: 'Earthed (Class I)',
  double_insulated: 'Double-insulated (Class II)',
  live_chassis: 'Live chassis',
  low_voltage: 'Battery or low voltage only',
  not_known: 'Not known',
}

export const FITTING_CONDITIONS = ['sound', 'perished', 'missing', 'wrong', 'not_looked', 'not_applicable'] as const
export type FittingCondition = (typeof FITTING_CONDITIONS)[number]
export const FITTING_CONDITION_LABELS: Record<FittingCondition, string> = {
  sound: 'Sound',
  perished: 'Perished or damaged',
  missing: 'Missing or cut off',
  wrong: 'Wrong type or rating',
  not_looked: 'Not looked',
  not_applicable: 'Not applicable',
}

export const TRIAGE_VERDICTS = ['may_be_powered', 'do_not_power', 'hazard_hold'] as const
export type TriageVerdict = (typeof TRIAGE_VERDICTS)[number]
export const TRIAGE_VERDICT_LABELS: Record<TriageVerdict, string> = {
  may_be_powered: 'May be powered through a limiter',
  do_not_power: 'Do not power',
  hazard_hold: 'Hazard hold',
}

export const HAZARDS = [
  'live_chassis', 'perished_insulation', 'stored_charge', 'crt', 'selenium', 'asbestos', 'radium', 'mercury', 'pcb_oil',
  'beryllia', 'filter_capacitor', 'battery_leak', 'heavy', 'mould',
] as const
export type Hazard = (typeof HAZARDS)[number]
export const HAZARD_LABELS: Record<Hazard, string> = {
  live_chassis: 'Live (transformerless) chassis',
  perished_insulation: 'Perished insulation',
  stored_charge: 'Stored charge',
  crt: 'Cathode-ray tube: EHT and implosion',
  selenium: 'Selenium rectifier',
  asbestos: 'Asbestos suspected',
  radium: 'Luminous (radium) markings',
  mercury: 'Mercury',
  pcb_oil: 'Oil-filled capacitor, PCB suspected',
  beryllia: 'Beryllia ceramic',
  filter_capacitor: 'Cracked mains filter capacitor',
  battery_leak: 'Battery leakage',
  heavy: 'Two-person lift',
  mould: 'Mould, pest or smoke residue',
}

/** The usual caution for each hazard, shown wherever the hazard is. */
export const HAZARD_CAUTIONS: Record<Hazard, string> = {
  live_chassis: 'The chassis can be at mains potential either way round. Work only through an isolating transformer and fit no socket or earth without understanding the circuit.',
  perished_insulation: 'Do not connect to the mains. Rewire first.',
  stored_charge: 'Capacitors can hold a lethal charge long after switching off. Bleed through a resistor, then prove dead, then prove again.',
  crt: 'EHT and implosion. Use a high-voltage probe, discharge the anode, never lift by the neck, protect eyes and hands.',
  selenium: 'A selenium stack that burns gives off poisonous fumes. Switch off, leave the room, ventilate.',
  asbestos: 'Do not disturb, brush or blow. Bag it and take advice; the law on sale differs by country.',
  radium: 'Leave sealed. Do not open, scrape or sand. Wash hands. Carriers have rules for it.',
  mercury: 'Do not break. Contain it, and keep it off the parcel shelf: carriers have rules for it.',
  pcb_oil: 'Gloves; bag any leak; no heat. Ask the environment authority before disposal or sale.',
  beryllia: 'Intact it is harmless; its dust is not. Never file, crush or grind.',
  filter_capacitor: 'Replace before power: cracked filter capacitors fail short, with smoke.',
  battery_leak: 'Remove the cells, photograph the leak, neutralise, gloves on.',
  heavy: 'Two people to lift. Do not stack on glass dials.',
  mould: 'Isolate from other stock; mask when opening.',
}

export const FIRST_POWER_CAUTION = 'Old mains and valve equipment can kill. First power only by a competent person, attended, through a lamp limiter or isolating transformer, one hand where possible, a second person within call for high voltage. Local codes and licensed practice come before anything written here.'
