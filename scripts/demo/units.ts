import type { DemoTest } from './readings'
import type { SourceKind } from '../../shared/domain/acquisition'
import type { SafetyClass, Hazard, TriageVerdict } from '../../shared/domain/triage'
import type { UnitState } from '../../shared/domain/unit-state-names'
import type { Job } from './work'

/** One piece's life, in days before today. What is left out is decided by its kind. */
export interface DemoUnit {
  model: string
  serial: string | null
  /** Days since it was booked in. */
  days: number
  state: UnitState
  place: string
  source: SourceKind
  from?: string
  /** Pounds paid; null for a consigned piece. */
  cost: number | null
  asking?: number
  consignor?: string
  condition: string
  set?: string
  missing?: string[]
  triage?: { class?: SafetyClass, verdict?: TriageVerdict, hazards?: Hazard[], because?: string } | null
  work?: [Job, number][]
  tests?: DemoTest[]
  safety?: number
  notEnergised?: string
  buyer?: string
  until?: number
  published?: boolean
  why?: string
}

const E = 'As found, dusty, complete as far as seen'
const good = 'Clean, light scratches on the case, panel lettering sharp'
const worn = 'Paint worn at the corners, one knob chipped, works dusty'

export const DEMO_UNITS: readonly DemoUnit[] = [
  // The piece everybody shows first: before and after alignment, selenium bypassed.
  { model: '307-G', serial: '4417', days: 266, state: 'offered', place: 'Long store/L3/B', source: 'house_clearance', from: 'Estate of a radio amateur', cost: 60, asking: 185, condition: 'Panel very good, case rubbed at both top edges; smelt of damp, dried out', set: '240 V, fused three-pin plug', missing: ['Dummy aerial'], work: [['extraSocket', 264], ['lead', 258], ['selenium', 258], ['mainsFilter', 257], ['align', 24], ['micas', 24]], tests: [{ daysAgo: 200, bias: -1.1, errors: { 2: -3.2, 11: -2.3 } }, { daysAgo: 22, bias: -0.3, errors: { 12: -2.25 }, found: { 3: -2.7, 6: -3.1, 9: -2.4, 12: -3.6 }, drift: true }], safety: 21, published: true },
  { model: '307-G', serial: '5102', days: 150, state: 'bench', place: 'Bench room/Bench 1', source: 'club_sale', cost: 45, condition: worn, work: [['lead', 40]], tests: [{ daysAgo: 8, open: true }] },
  { model: '307-G', serial: null, days: 12, state: 'intake', place: 'Quarantine', source: 'private_seller', from: 'Caller at the door', cost: 30, condition: 'No serial plate; back missing, valves loose in a bag', triage: null, missing: ['Terminated output lead', 'Dummy aerial', 'Handbook'] },
  { model: '318-GX', serial: '11873', days: 190, state: 'ready', place: 'Long store/L3/B', source: 'auction', from: 'Harbour auctions, lot 88', cost: 95, asking: 260, condition: good, set: '240 V, three-pin plug', work: [['mainsFilter', 60], ['smoothing', 60], ['micas', 59]], tests: [{ daysAgo: 50 }], safety: 49 },
  { model: '6120-B', serial: 'B-20917', days: 230, state: 'held', place: 'Hold shelf', source: 'surplus', from: 'A technical college', cost: 140, asking: 340, condition: 'Rack ears bent and straightened, panel good', set: '230 V, moulded plug', work: [['rail', 90], ['lamps', 88]], tests: [{ daysAgo: 80, bias: 0.2 }], safety: 79, buyer: 'Buyer 118', until: 9, published: true },
  { model: '6120-B', serial: 'B-21044', days: 75, state: 'bench', place: 'Bench room/Bench 2', source: 'surplus', cost: 90, condition: worn, work: [['rail', 20]], tests: [] },
  { model: 'V 44', serial: '3-0552', days: 160, state: 'offered', place: 'Long store/L3/C', source: 'trade', from: 'Another dealer', cost: 110, asking: 220, condition: good, set: '240 V', work: [['timebase', 70]], tests: [{ daysAgo: 66, errors: { 9: 2.6 } }], safety: 65, published: true },
  { model: 'MS 5', serial: '774', days: 210, state: 'bench', place: 'Hazard cage', source: 'house_clearance', cost: 15, condition: 'Cloth and asbestos-braid resistance lead, untouched', triage: { class: 'live_chassis', verdict: 'hazard_hold', hazards: ['live_chassis', 'asbestos', 'perished_insulation'], because: 'Resistance lead with suspected asbestos braid' } },
  { model: 'MS 5', serial: '1206', days: 320, state: 'parted', place: 'Long store/L9/D', source: 'club_sale', cost: 10, condition: 'Chassis rusted through, coils good', triage: { class: 'live_chassis', verdict: 'do_not_power', hazards: ['live_chassis', 'perished_insulation'] }, why: 'Beyond economic repair; coils and dial kept for parts' },
  { model: 'PG-19', serial: '640112', days: 120, state: 'ready', place: 'Long store/L3/D', source: 'auction', cost: 55, asking: 145, condition: good, set: '230 V', missing: ['Detector probe'], work: [['suppressor', 45]], tests: [{ daysAgo: 40 }], safety: 39 },
  { model: 'FSG-711', serial: 'K40881', days: 100, state: 'offered', place: 'Long store/L4/A', source: 'trade_in', cost: 80, asking: 210, condition: good, set: '240 V, moulded plug', tests: [{ daysAgo: 35 }], safety: 34, published: true },
  { model: 'AO-12', serial: '2231', days: 180, state: 'offered', place: 'Long store/L4/B', source: 'house_clearance', cost: 25, asking: 95, condition: worn, set: '240 V', work: [['smoothing', 72], ['coupling', 72]], tests: [{ daysAgo: 64, errors: { 3: 2.4 } }], safety: 63 },
  { model: 'AO-40D', serial: '1190', days: 140, state: 'offered', place: 'Shop room/Case/1', source: 'surplus', cost: 40, asking: 135, condition: good, set: 'Battery', work: [['thermistor', 55]], tests: [{ daysAgo: 52 }], safety: 51, published: true },
  { model: 'AO-40D', serial: '1344', days: 9, state: 'intake', place: 'Quarantine', source: 'surplus', cost: 35, condition: 'Battery left in, some leakage seen', triage: null },
  { model: '2270', serial: '22-871', days: 250, state: 'dispatched', place: 'Packing table', source: 'surplus', cost: 50, asking: 150, condition: good, set: '230 V', work: [['smoothing', 140]], tests: [{ daysAgo: 130 }], safety: 129, buyer: 'Buyer 104', published: true },
  { model: 'LD-2', serial: '0087', days: 85, state: 'ready', place: 'Long store/L4/B', source: 'private_seller', cost: 120, asking: 290, condition: good, set: '240 V, moulded plug', tests: [{ daysAgo: 30 }], safety: 29 },
  { model: '1204', serial: '120-556', days: 300, state: 'offered', place: 'Long store/L5/A', source: 'house_clearance', cost: 20, asking: 90, condition: worn, set: '240 V', work: [['smoothing', 200], ['lead', 200], ['repaint', 202]], tests: [{ daysAgo: 190 }], safety: 189 },
  { model: '1370/P', serial: '13-4410', days: 280, state: 'ready', place: 'Long store/L5/floor', source: 'surplus', from: 'A university workshop', cost: 70, asking: 320, condition: 'Trolley lost, mainframe clean', set: '230 V', missing: ['Plug-in 70D', 'Extender'], work: [['selenium', 100], ['rail', 99]], tests: [{ daysAgo: 95 }], safety: 94 },
  { model: '1370/P', serial: '13-4092', days: 340, state: 'parted', place: 'Long store/L9/D', source: 'surplus', cost: 10, condition: 'Mains transformer open, tube good', triage: { verdict: 'do_not_power', hazards: ['crt', 'selenium'] }, why: 'Donor for tube, plug-ins and knobs' },
  { model: 'CR-9', serial: '9-1102', days: 200, state: 'bench', place: 'Bench room/Soak shelf', source: 'club_sale', cost: 35, condition: 'One beam dim', work: [['smoothing', 60], ['drilled', 62]], tests: [{ daysAgo: 30 }] },
  { model: 'P 27', serial: '27-30871', days: 130, state: 'offered', place: 'Shop room/Case/2', source: 'trade_in', cost: 60, asking: 165, condition: good, set: '240 V and 24 V DC lead', work: [['tube', 70]], tests: [{ daysAgo: 60 }], safety: 59, published: true },
  { model: 'P 27', serial: '27-31220', days: 30, state: 'bench', place: 'Bench room/Bench 2', source: 'private_seller', cost: 40, condition: worn, missing: ['×10 probe'] },
  { model: '5110-D', serial: 'D7701934', days: 90, state: 'sold', place: 'Packing table', source: 'auction', cost: 130, asking: 280, condition: good, set: '240 V, moulded plug', tests: [{ daysAgo: 40 }], safety: 39, buyer: 'Buyer 121', published: true },
  { model: '5110-D', serial: 'D7702288', days: 45, state: 'ready', place: 'Long store/L5/B', source: 'auction', cost: 115, asking: 270, condition: good, set: '240 V, moulded plug', tests: [{ daysAgo: 12 }], safety: 11 },
  { model: 'VV-6', serial: '6-2207', days: 220, state: 'offered', place: 'Long store/L6/A', source: 'house_clearance', cost: 18, asking: 75, condition: worn, set: '240 V', missing: ['High-voltage divider'], work: [['diodeValve', 110]], tests: [{ daysAgo: 100 }], safety: 99 },
  { model: '417-Q', serial: 'Q-5530', days: 170, state: 'ready', place: 'Long store/L6/A', source: 'surplus', cost: 48, asking: 160, condition: good, set: '230 V', tests: [{ daysAgo: 58 }], safety: 57 },
  { model: 'MV-20', serial: '0419', days: 110, state: 'offered', place: 'Long store/L6/B', source: 'auction', cost: 38, asking: 110, condition: good, set: '240 V', tests: [{ daysAgo: 44 }], safety: 43 },
  { model: 'M7', serial: '88213', days: 195, state: 'sold', place: 'Packing table', source: 'club_sale', cost: 22, asking: 85, condition: 'Case good, strap perished', set: 'Battery', work: [['cell', 90]], tests: [{ daysAgo: 85 }], safety: 84, buyer: 'Buyer 117', published: true },
  { model: 'M7', serial: '90441', days: 60, state: 'offered', place: 'Shop room/Case/1', source: 'private_seller', cost: 20, asking: 80, condition: good, set: 'Battery', work: [['cell', 25]], tests: [{ daysAgo: 20 }], safety: 19 },
  { model: 'M7', serial: null, days: 4, state: 'intake', place: 'Quarantine', source: 'private_seller', cost: 12, condition: 'Serial plate painted over; meter sticks', triage: null, missing: ['High-voltage multiplier', 'Carrying case'] },
  { model: 'UB-1', serial: '551', days: 240, state: 'offered', place: 'Long store/L6/C', source: 'surplus', cost: 30, asking: 120, condition: worn, set: '240 V', work: [['knob', 120]], tests: [{ daysAgo: 112 }], safety: 111 },
  { model: 'UB-5T', serial: '66-120', days: 95, state: 'ready', place: 'Long store/L6/C', source: 'trade', cost: 35, asking: 95, condition: good, set: 'Battery', tests: [{ daysAgo: 33 }], safety: 32 },
  { model: 'RLCG-2', serial: '2-0731', days: 155, state: 'held', place: 'Hold shelf', source: 'surplus', cost: 85, asking: 240, condition: good, set: '240 V', tests: [{ daysAgo: 48 }], safety: 47, buyer: 'Buyer 109', until: 4 },
  { model: 'T 508', serial: '508-1177', days: 205, state: 'offered', place: 'Long store/L7/A', source: 'auction', cost: 70, asking: 195, condition: good, set: '240 V, moulded plug', work: [['timebase', 120]], tests: [{ daysAgo: 118 }], safety: 117, published: true },
  { model: 'T 508', serial: '508-1305', days: 18, state: 'bench', place: 'Bench room/Bench 1', source: 'trade_in', cost: 55, condition: 'Two digits dark' },
  { model: '5030-N', serial: '5-00912', days: 310, state: 'returned', place: 'Quarantine', source: 'surplus', cost: 90, asking: 230, condition: good, set: '230 V', work: [['rail', 200]], tests: [{ daysAgo: 190 }], safety: 189, buyer: 'Buyer 096', why: 'Came back: last digit dark after transit' },
  { model: 'K-8', serial: 'K8-044', days: 260, state: 'bench', place: 'Bench room/Soak shelf', source: 'club_sale', cost: 25, condition: 'One counting tube missing' },
  { model: 'CR-70', serial: '70-3318', days: 290, state: 'offered', place: 'Long store/L1/floor', source: 'house_clearance', from: 'A ship’s radio officer', cost: 160, asking: 420, condition: 'Original wrinkle finish, small chips, dial clear', set: '230 V', work: [['lamps', 150], ['finish', 150], ['lead', 151], ['oldRecap', 152]], tests: [{ daysAgo: 140, errors: { 15: -1.3 } }], safety: 139, triage: { hazards: ['heavy', 'radium'] }, published: true },
  { model: 'CG-12', serial: '12-901', days: 215, state: 'ready', place: 'Long store/L1/floor', source: 'surplus', cost: 130, asking: 380, condition: 'Bulkhead brackets rusty, panel good', notEnergised: 'Untested: DC/AC live-chassis set, sold for display and not to be energised.', triage: { class: 'live_chassis', verdict: 'do_not_power', hazards: ['live_chassis', 'heavy'] } },
  { model: '54-HV', serial: '54-6620', days: 245, state: 'offered', place: 'Long store/L1/A', source: 'private_seller', cost: null, consignor: 'Consignor 3', asking: 360, condition: worn, set: '117 V through a transformer', work: [['extraSocket', 170], ['bung', 160], ['ifCan', 158]], tests: [{ daysAgo: 150 }], safety: 149 },
  { model: '54-HV', serial: '54-7001', days: 20, state: 'intake', place: 'Quarantine', source: 'consignor', cost: null, consignor: 'Consignor 5', condition: E, missing: ['Crystal calibrator'] },
  { model: 'M 222', serial: '222-0484', days: 125, state: 'offered', place: 'Long store/L1/B', source: 'trade', cost: 240, asking: 520, condition: good, set: '240 V, moulded plug', tests: [{ daysAgo: 50, errors: { 2: 0.7 } }], safety: 49, published: true },
  { model: 'M 222', serial: '222-0517', days: 55, state: 'bench', place: 'Bench room/Bench 1', source: 'auction', cost: 210, condition: worn, work: [['rail', 10]], tests: [{ daysAgo: 30 }] },
  { model: 'AR-404', serial: 'A4402218', days: 105, state: 'ready', place: 'Long store/L1/B', source: 'house_clearance', cost: 150, asking: 310, condition: good, set: '240 V', missing: ['2 m converter'], tests: [{ daysAgo: 38 }], safety: 37 },
  { model: '46W', serial: '46-22018', days: 270, state: 'offered', place: 'Shop room/Window', source: 'house_clearance', cost: 25, asking: 140, condition: 'Cabinet sound, cloth original, small worm holes treated', set: '240 V', work: [['coupling', 160], ['smoothing', 160], ['lead', 159]], tests: [{ daysAgo: 150 }], safety: 149, published: true },
  { model: '46W', serial: '46-23110', days: 15, state: 'bench', place: 'Bench room/Bench 2', source: 'private_seller', cost: 20, condition: 'Back missing, speaker torn', missing: ['Back'], triage: { hazards: ['perished_insulation', 'stored_charge'], verdict: 'do_not_power' } },
  { model: '46W', serial: null, days: 330, state: 'written_off', place: 'Long store/L9/D', source: 'house_clearance', cost: 8, condition: 'Water damage, cabinet delaminated', triage: { verdict: 'do_not_power' }, why: 'Roof leak over bay 9; taken to the recycler' },
  { model: 'OS-34', serial: '34-77120', days: 165, state: 'sold', place: 'Packing table', source: 'club_sale', cost: 30, asking: 130, condition: good, set: '220 V', work: [['rewind', 80]], tests: [{ daysAgo: 70 }], safety: 69, buyer: 'Buyer 120', published: true },
  { model: 'OS-34', serial: '34-80013', days: 50, state: 'ready', place: 'Long store/L2/A', source: 'auction', cost: 28, asking: 125, condition: worn, set: '220 V', tests: [{ daysAgo: 14 }], safety: 13 },
  { model: 'T-31', serial: '31-518', days: 135, state: 'offered', place: 'Long store/L2/B', source: 'trade_in', cost: 22, asking: 85, condition: good, set: '240 V', work: [['suppressor', 66]], tests: [{ daysAgo: 60 }], safety: 59 },
  { model: 'ST-88K', serial: 'S8831107', days: 115, state: 'offered', place: 'Shop room/Case/2', source: 'private_seller', cost: 45, asking: 150, condition: good, set: '240 V, moulded plug', work: [['separation', 30]], tests: [{ daysAgo: 28 }], safety: 27, published: true },
  { model: 'ST-88K', serial: 'S8832290', days: 235, state: 'dispatched', place: 'Packing table', source: 'private_seller', cost: 40, asking: 145, condition: good, set: '240 V', tests: [{ daysAgo: 150 }], safety: 149, buyer: 'Buyer 111' },
  { model: 'Pair 25', serial: '25-118/119', days: 225, state: 'held', place: 'Hold shelf', source: 'consignor', cost: null, consignor: 'Consignor 2', asking: 980, condition: 'Both chassis re-plated long ago; cages original', set: '240 V', work: [['inlet', 130], ['repaint', 132]], tests: [{ daysAgo: 120 }], safety: 119, buyer: 'Buyer 122', until: 12, published: true },
  { model: 'A60S', serial: '6-04471', days: 145, state: 'offered', place: 'Shop room/Case/2', source: 'private_seller', cost: 55, asking: 190, condition: good, set: '240 V, moulded plug', work: [['outputPair', 75]], tests: [{ daysAgo: 68 }], safety: 67 },
  { model: 'A60S', serial: '6-05810', days: 25, state: 'bench', place: 'Bench room/Bench 1', source: 'trade_in', cost: 35, condition: 'Relay chatters, cover scratched' },
  { model: 'TR 2/10', serial: '210-3307', days: 80, state: 'ready', place: 'Long store/L2/C', source: 'house_clearance', cost: 60, asking: 140, condition: good, set: '13.8 V DC', work: [['crystal', 30]], tests: [{ daysAgo: 26 }], safety: 25 },
  { model: 'PS-400', serial: '400-220', days: 175, state: 'offered', place: 'Long store/L7/B', source: 'surplus', cost: 28, asking: 110, condition: worn, set: '240 V', work: [['smoothing', 88]], tests: [{ daysAgo: 82 }], safety: 81 },
  { model: 'PS-400', serial: '400-315', days: 6, state: 'intake', place: 'Quarantine', source: 'surplus', cost: 25, condition: E },
  { model: 'VT-3', serial: '3-1184', days: 185, state: 'offered', place: 'Long store/L7/C', source: 'auction', cost: 95, asking: 280, condition: good, set: '240 V', tests: [{ daysAgo: 92 }], safety: 91 },
  { model: 'VT-3', serial: '3-0967', days: 35, state: 'returned', place: 'Quarantine', source: 'auction', cost: 80, asking: 260, condition: worn, set: '240 V', tests: [{ daysAgo: 28 }], safety: 27, buyer: 'Buyer 115', why: 'Came back: buyer’s mains is 115 V' },
]
