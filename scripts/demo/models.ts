import type { EquipmentKind, Technology } from '../../shared/domain/equipment-kinds'
import type { CoverageFunction } from '../../shared/domain/functions'
import type { KeptWithKind } from '../../shared/domain/kept-with'
import type { Hazard } from '../../shared/domain/triage'

export interface DemoBand { label: string, function: CoverageFunction, lowerHz: number, upperHz: number }
export interface DemoModel {
  /** How the demo's units name their model. */
  key: string
  maker: string
  designation: string
  kind: EquipmentKind
  technology: Technology
  yearsFrom: number
  yearsTo: number
  supply: string
  /** ± per cent of the setting; null where there is no dial to check. */
  dialTolerancePercent: number | null
  modulationHz: number | null
  summary: string
  typicalHazards: Hazard[]
  bands: DemoBand[]
  kit: { kind: KeptWithKind, description: string, quantity: number }[]
}

const SUFFIXES: Record<string, number> = { '': 1, 'k': 1e3, 'M': 1e6 }

/** `100k` → 100 000. */
function hertz(text: string): number {
  const parts = /^([\d.]+)([kM]?)$/.exec(text)
  const factor = SUFFIXES[parts?.[2] ?? '?']
  if (!parts || factor === undefined) throw new Error(`${text} is not a frequency`)
  return Math.round(Number(parts[1]) * factor)
}

/** `100k-320k 320k-1M` → bands A, B…; a stretch left out is a true gap, one figure a spot frequency. */
function bands(does: CoverageFunction, spans: string, labels = 'ABCDEFGHJK'): DemoBand[] {
  return spans.split(' ').map((span, index) => {
    const [lower = '', upper = lower] = span.split('-')
    return { label: labels.charAt(index), function: does, lowerHz: hertz(lower), upperHz: hertz(upper) }
  })
}

/** `lead: terminated output lead; manual: handbook` → kit lines. */
function kit(text: string): DemoModel['kit'] {
  const kinds: Record<string, KeptWithKind> = {
    lead: 'lead', manual: 'manual', probe: 'probe', plug: 'plug_in', spare: 'spare', case: 'case', doc: 'document', cover: 'cover', other: 'other',
  }
  return text.split('; ').map((line) => {
    const [kind = '', description = ''] = line.split(': ')
    const times = /^(\d) × (.*)$/.exec(description)
    return { kind: kinds[kind] ?? 'other', description: times?.[2] ?? description, quantity: Number(times?.[1] ?? 1) }
  })
}

interface Row extends Pick<DemoModel, 'key' | 'maker' | 'designation' | 'kind' | 'technology' | 'supply' | 'bands'> {
  years: [number, number]
  kit: string
  tolerance?: number
  modulation?: number
  hazards?: Hazard[]
  summary?: string
}

const ROWS: Row[] = [
  { key: '307-G', maker: 'Oxmarden', designation: '307-G', kind: 'rf_generator', technology: 'valve', years: [1951, 1959], supply: '110/200–250 V 50 Hz', tolerance: 2, modulation: 400, hazards: ['selenium', 'stored_charge'], summary: 'Service-grade generator with a five-band drum dial and a piston attenuator.', bands: bands('generates', '100k-320k 320k-1M 1M-3.2M 3.2M-10M 10M-32M'), kit: 'lead: Terminated output lead; other: Dummy aerial; manual: Handbook' },
  { key: '318-GX', maker: 'Oxmarden', designation: '318-GX', kind: 'rf_generator', technology: 'valve', years: [1958, 1966], supply: '200–250 V 50 Hz', tolerance: 1, modulation: 400, hazards: ['stored_charge'], summary: 'The 307 circuit with eight bands and a 1 MHz crystal check.', bands: bands('generates', '85k-175k 170k-360k 350k-730k 720k-1.5M 1.45M-3.1M 3M-6.4M 6.2M-14M 13.5M-30M'), kit: 'spare: 1 MHz crystal; other: Earpiece; other: 20 dB pad; manual: Handbook' },
  { key: '6120-B', maker: 'Haldraven', designation: '6120-B', kind: 'rf_generator', technology: 'valve', years: [1959, 1971], supply: '115/230 V 50–60 Hz', tolerance: 1, modulation: 1000, hazards: ['heavy', 'stored_charge'], summary: 'Standard generator, levelled output, crystal calibrator.', bands: bands('generates', '55k-180k 175k-600k 580k-2M 1.9M-6.5M 6.2M-21M 20M-62M'), kit: 'lead: 50 Ω output lead; other: 2 × Rack ears; doc: Calibration chart; manual: Handbook' },
  { key: 'V 44', maker: 'Lindvassa', designation: 'V 44', kind: 'rf_generator', technology: 'hybrid', years: [1963, 1972], supply: '110–240 V 50 Hz', tolerance: 2, modulation: 1000, summary: 'VHF generator with AM and FM.', bands: bands('generates', '10M-40M 40M-110M 110M-240M', '123'), kit: 'doc: FM deviation chart; other: Coaxial adaptor; manual: Handbook' },
  { key: 'MS 5', maker: 'Dornquell', designation: 'MS 5', kind: 'rf_generator', technology: 'valve', years: [1937, 1949], supply: '110–240 V AC/DC', tolerance: 3, modulation: 400, hazards: ['live_chassis', 'asbestos', 'perished_insulation'], summary: 'Transformerless service oscillator; the region round 350 kHz is not covered.', bands: bands('generates', '100k-300k 400k-1.6M 1.5M-6M 6M-22M', '1234'), kit: 'lead: Screened lead; plug: 2 × Coil box' },
  { key: 'PG-19', maker: 'Zelwicz', designation: 'PG-19', kind: 'sweep_generator', technology: 'valve', years: [1964, 1975], supply: '220 V 50 Hz', tolerance: 3, hazards: ['stored_charge'], summary: 'Sweeper with crystal markers for IF and band II work.', bands: bands('generates', '400k-500k 10M-12M 30M-45M 85M-110M', '1234'), kit: 'probe: Detector probe; spare: Marker crystal 5.5 MHz; spare: Marker crystal 10.7 MHz' },
  { key: 'FSG-711', maker: 'Kuremori', designation: 'FSG-711', kind: 'stereo_generator', technology: 'transistor', years: [1974, 1983], supply: '100–240 V 50–60 Hz', tolerance: 1, summary: 'FM multiplex generator: pilot, subcarrier and a modulated carrier.', bands: bands('generates', '19k 38k 76M-108M', '123'), kit: 'other: 75/300 Ω matching pad; lead: Lead set; manual: Handbook' },
  { key: 'AO-12', maker: 'Gellershaw', designation: 'AO-12', kind: 'audio_oscillator', technology: 'valve', years: [1948, 1956], supply: '200–250 V 50 Hz', tolerance: 2, hazards: ['stored_charge'], bands: bands('generates', '20-200 200-2k 2k-20k', '123'), kit: 'other: 600 Ω line transformer; manual: Handbook' },
  { key: 'AO-40D', maker: 'Gellershaw', designation: 'AO-40D', kind: 'audio_oscillator', technology: 'transistor', years: [1961, 1970], supply: '2 × 9 V battery or 230 V adaptor', tolerance: 1, hazards: ['battery_leak'], summary: 'Decade-switched oscillator, thermistor stabilised.', bands: bands('generates', '1-111k', '×'), kit: 'case: Battery tray; spare: Shorting link' },
  { key: '2270', maker: 'Haldraven', designation: '2270', kind: 'audio_oscillator', technology: 'valve', years: [1954, 1968], supply: '115/230 V 50–60 Hz', tolerance: 2, bands: bands('generates', '8-80 80-800 800-8k 8k-80k 80k-500k', '12345'), kit: 'other: Rack kit; spare: Stabilising lamp; manual: Handbook' },
  { key: 'LD-2', maker: 'Ohmbarrow', designation: 'LD-2', kind: 'audio_oscillator', technology: 'transistor', years: [1976, 1986], supply: '100–240 V 50–60 Hz', tolerance: 2, summary: 'Low-distortion oscillator with a balanced output.', bands: bands('generates', '10-100 100-1k 1k-10k 10k-100k', '1234'), kit: 'lead: Balanced output lead; manual: Handbook' },
  { key: '1204', maker: 'Glasmuir', designation: '1204', kind: 'oscilloscope', technology: 'valve', years: [1953, 1960], supply: '200–250 V 50 Hz', hazards: ['crt', 'stored_charge'], bands: [{ label: 'Y', function: 'measures', lowerHz: 0, upperHz: 4e6 }], kit: 'cover: Viewing hood; probe: ×10 probe; manual: Handbook' },
  { key: '1370/P', maker: 'Glasmuir', designation: '1370/P', kind: 'oscilloscope', technology: 'valve', years: [1959, 1969], supply: '110/230 V 50–60 Hz', hazards: ['crt', 'selenium', 'heavy'], summary: 'Plug-in mainframe; 30 MHz with plug-in 70A.', bands: [{ label: 'Y', function: 'measures', lowerHz: 0, upperHz: 30e6 }], kit: 'plug: Plug-in 70A; plug: Plug-in 70D; other: Extender; manual: Handbook' },
  { key: 'CR-9', maker: 'Oxmarden', designation: 'CR-9', kind: 'oscilloscope', technology: 'valve', years: [1950, 1957], supply: '200–250 V 50 Hz', hazards: ['crt', 'stored_charge'], summary: 'Double-beam oscilloscope.', bands: [{ label: 'Y', function: 'measures', lowerHz: 0, upperHz: 5e6 }], kit: 'other: Camera ring; other: Graticule filters' },
  { key: 'P 27', maker: 'Lindvassa', designation: 'P 27', kind: 'oscilloscope', technology: 'transistor', years: [1970, 1979], supply: '110–240 V AC, 24 V DC', hazards: ['crt'], summary: 'Portable, runs from a vehicle battery.', bands: [{ label: 'Y', function: 'measures', lowerHz: 0, upperHz: 25e6 }], kit: 'probe: 2 × ×10 probe; case: Pouch; cover: Front cover' },
  { key: '5110-D', maker: 'Kuremori', designation: '5110-D', kind: 'oscilloscope', technology: 'transistor', years: [1979, 1987], supply: '100–240 V 50–60 Hz', hazards: ['crt'], bands: [{ label: 'Y', function: 'measures', lowerHz: 0, upperHz: 100e6 }], kit: 'probe: 2 × ×10 probe; manual: Handbook' },
  { key: 'VV-6', maker: 'Hexcombe', designation: 'VV-6', kind: 'voltmeter', technology: 'valve', years: [1949, 1960], supply: '110/230 V 50 Hz', summary: 'Valve voltmeter; the AC ranges need the RF probe.', bands: [{ label: 'AC probe', function: 'measures', lowerHz: 20, upperHz: 50e6 }], kit: 'probe: RF probe; probe: DC probe; probe: High-voltage divider' },
  { key: '417-Q', maker: 'Haldraven', designation: '417-Q', kind: 'voltmeter', technology: 'valve', years: [1956, 1970], supply: '115/230 V 50–60 Hz', bands: [{ label: 'AC probe', function: 'measures', lowerHz: 30, upperHz: 450e6 }], kit: 'probe: Diode probe; other: T-connector; lead: Ohms lead' },
  { key: 'MV-20', maker: 'Hexcombe', designation: 'MV-20', kind: 'voltmeter', technology: 'valve', years: [1957, 1968], supply: '200–250 V 50 Hz', summary: 'AC millivoltmeter.', bands: [{ label: 'AC', function: 'measures', lowerHz: 10, upperHz: 4e6 }], kit: 'lead: Screened lead; doc: dB card' },
  { key: 'M7', maker: 'Stonnley', designation: 'M7', kind: 'multimeter', technology: 'passive', years: [1946, 1972], supply: '1.5 V and 15 V cells', hazards: ['battery_leak'], bands: [{ label: 'AC', function: 'measures', lowerHz: 25, upperHz: 10e3 }], kit: 'lead: Test leads; other: 2 × Clip; case: Carrying case; probe: High-voltage multiplier' },
  { key: 'UB-1', maker: 'Ohmbarrow', designation: 'UB-1', kind: 'bridge', technology: 'valve', years: [1955, 1968], supply: '200–250 V 50 Hz', bands: [{ label: 'Ext', function: 'measures', lowerHz: 20, upperHz: 20e3 }], kit: 'lead: External generator lead; manual: Handbook' },
  { key: 'UB-5T', maker: 'Ohmbarrow', designation: 'UB-5T', kind: 'bridge', technology: 'transistor', years: [1966, 1979], supply: '9 V battery', hazards: ['battery_leak'], bands: [{ label: 'Int', function: 'measures', lowerHz: 1e3, upperHz: 1e3 }], kit: 'other: Test jig; lead: Tweezers lead' },
  { key: 'RLCG-2', maker: 'Dornquell', designation: 'RLCG-2', kind: 'bridge', technology: 'transistor', years: [1969, 1981], supply: '110–240 V 50 Hz', bands: [{ label: 'Test', function: 'measures', lowerHz: 40, upperHz: 100e3 }], kit: 'other: Three-terminal jig; spare: Standard capacitor' },
  { key: 'T 508', maker: 'Lindvassa', designation: 'T 508', kind: 'counter', technology: 'transistor', years: [1974, 1984], supply: '110–240 V 50–60 Hz', summary: 'Prescaler above 50 MHz.', bands: [{ label: 'A', function: 'measures', lowerHz: 5, upperHz: 50e6 }, { label: 'B', function: 'measures', lowerHz: 50e6, upperHz: 500e6 }], kit: 'other: T-piece; lead: External standard lead' },
  { key: '5030-N', maker: 'Haldraven', designation: '5030-N', kind: 'counter', technology: 'hybrid', years: [1961, 1969], supply: '115/230 V 50–60 Hz', hazards: ['heavy'], summary: 'Neon-digit counter; 90 MHz with plug-in 5031.', bands: [{ label: 'Base', function: 'measures', lowerHz: 0, upperHz: 11e6 }, { label: '5031', function: 'measures', lowerHz: 10e6, upperHz: 90e6 }], kit: 'plug: Plug-in 5031; other: 2 × Rack ears; manual: Handbook' },
  { key: 'K-8', maker: 'Oxmarden', designation: 'K-8', kind: 'counter', technology: 'valve', years: [1958, 1964], supply: '200–250 V 50 Hz', hazards: ['stored_charge'], bands: [{ label: 'A', function: 'measures', lowerHz: 10, upperHz: 1.2e6 }], kit: 'spare: 2 × Counting tube' },
  { key: 'CR-70', maker: 'Skerrymore', designation: 'CR-70', kind: 'communications_receiver', technology: 'valve', years: [1941, 1952], supply: '100–250 V or 24 V vibrator', tolerance: 1, hazards: ['heavy', 'radium'], summary: 'Ship’s receiver; the region round its IF is not covered.', bands: bands('tunes', '75k-400k 530k-1.4M 1.4M-3.5M 3.5M-9M 9M-28M', '12345'), kit: 'other: Loudspeaker LS-7; lead: Power lead; other: Headphones' },
  { key: 'CG-12', maker: 'Skerrymore', designation: 'CG-12', kind: 'communications_receiver', technology: 'valve', years: [1953, 1964], supply: '110/220 V DC/AC', tolerance: 1, hazards: ['live_chassis', 'heavy'], bands: bands('tunes', '150k-420k 600k-1.6M 1.6M-4M 4M-12M 12M-25M', '12345'), kit: 'lead: DF loop lead; other: 2 × Shelf bracket' },
  { key: '54-HV', maker: 'Haldraven', designation: '54-HV', kind: 'communications_receiver', technology: 'valve', years: [1948, 1955], supply: '105–125 V 60 Hz', tolerance: 1, hazards: ['heavy'], bands: bands('tunes', '540k-1.6M 1.6M-4.8M 4.6M-14M 14M-31M 48M-54M', '12345'), kit: 'other: Loudspeaker; other: Crystal calibrator; manual: Handbook' },
  { key: 'M 222', maker: 'Ferdlund', designation: 'M 222', kind: 'communications_receiver', technology: 'hybrid', years: [1966, 1978], supply: '110–240 V 50–60 Hz', tolerance: 0.5, summary: 'General coverage without a gap.', bands: bands('tunes', '250k-30M', '×'), kit: 'plug: LF converter; other: Extender card; manual: Handbook' },
  { key: 'AR-404', maker: 'Kuremori', designation: 'AR-404', kind: 'communications_receiver', technology: 'hybrid', years: [1969, 1976], supply: '100–240 V 50–60 Hz', tolerance: 0.5, summary: 'The five classic amateur bands.', bands: bands('tunes', '3.5M-4M 7M-7.3M 14M-14.35M 21M-21.45M 28M-29.7M', '12345'), kit: 'plug: 2 m converter; spare: Crystal set; manual: Handbook' },
  { key: '46W', maker: 'Stonnley', designation: '46W', kind: 'domestic_receiver', technology: 'valve', years: [1946, 1949], supply: '200–250 V 50 Hz', tolerance: 3, hazards: ['stored_charge', 'perished_insulation'], bands: bands('tunes', '150k-300k 545k-1.5M 6M-18M', 'LMS'), kit: 'cover: Back; lead: Mains lead; spare: Station glass' },
  { key: 'OS-34', maker: 'Zelwicz', designation: 'OS-34', kind: 'domestic_receiver', technology: 'valve', years: [1958, 1964], supply: '110–220 V 50 Hz', tolerance: 3, hazards: ['stored_charge'], bands: bands('tunes', '150k-285k 525k-1.605M 5.95M-15.5M 65.8M-73M', 'LMKU'), kit: 'cover: Back; lead: Gramophone lead' },
  { key: 'T-31', maker: 'Hexcombe', designation: 'T-31', kind: 'tuner', technology: 'valve', years: [1962, 1968], supply: '200–250 V 50 Hz', tolerance: 1, bands: bands('tunes', '87.5M-108M', 'U'), kit: 'other: Dipole; lead: Phono lead' },
  { key: 'ST-88K', maker: 'Kuremori', designation: 'ST-88K', kind: 'tuner', technology: 'transistor', years: [1975, 1980], supply: '110–240 V 50–60 Hz', tolerance: 1, bands: bands('tunes', '525k-1.61M 87.5M-108M', 'MU'), kit: 'other: AM bar aerial; case: Walnut sleeve' },
  { key: 'Pair 25', maker: 'Stonnley', designation: 'Pair 25', kind: 'amplifier', technology: 'valve', years: [1957, 1965], supply: '110/200–250 V 50 Hz', hazards: ['stored_charge', 'heavy'], summary: 'A pair of valve power amplifiers; never run without a load.', bands: bands('passes', '20-50k', '×'), kit: 'cover: 2 × Valve cage; lead: Umbilical; spare: Matched output pair' },
  { key: 'A60S', maker: 'Elettravena', designation: 'A60S', kind: 'amplifier', technology: 'transistor', years: [1971, 1977], supply: '110–240 V 50–60 Hz', bands: bands('passes', '10-40k', '×'), kit: 'lead: Gramophone leads; cover: 4 × Foot; cover: Cover' },
  { key: 'TR 2/10', maker: 'Ferdlund', designation: 'TR 2/10', kind: 'transceiver', technology: 'transistor', years: [1976, 1983], supply: '13.8 V DC', summary: 'Transmit only into a dummy load, or with a licence.', bands: [{ label: 'RX', function: 'tunes', lowerHz: 144e6, upperHz: 146e6 }, { label: 'TX', function: 'transmits', lowerHz: 144e6, upperHz: 146e6 }], kit: 'other: Microphone; other: Bracket; lead: Power lead' },
  { key: 'PS-400', maker: 'Gellershaw', designation: 'PS-400', kind: 'power_supply', technology: 'valve', years: [1955, 1965], supply: '200–250 V 50 Hz', hazards: ['stored_charge'], summary: '0–400 V at 0–100 mA, and 6.3 V for heaters.', bands: [], kit: 'lead: Output leads; spare: Shorting link' },
  { key: 'VT-3', maker: 'Hexcombe', designation: 'VT-3', kind: 'valve_tester', technology: 'valve', years: [1950, 1962], supply: '200–250 V 50 Hz', hazards: ['stored_charge'], summary: 'Mutual conductance to 15 mA/V; readings are an indication only.', bands: [], kit: 'doc: Data book; lead: 2 × Top-cap lead; other: Base adaptors; spare: Protective lamp' },
]

/** The demo's catalogue: makers, types and figures are invented. */
export const DEMO_MODELS: readonly DemoModel[] = ROWS.map(({ years: [yearsFrom, yearsTo], kit: items, tolerance, modulation, hazards, summary, ...row }) => ({
  ...row, yearsFrom, yearsTo, kit: kit(items), dialTolerancePercent: tolerance ?? null, modulationHz: modulation ?? null, typicalHazards: hazards ?? [], summary: summary ?? '',
}))
