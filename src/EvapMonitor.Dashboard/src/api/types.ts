/** What the REST interface answers, member by member as docs/api.md writes it. Times are RFC 3339 in UTC; units are in the names. */

export type Instant = string;

/** Youngest reading under 15 minutes old, older, or none at all. */
export type ReadingsState = 'live' | 'stale' | 'none';

export interface Site {
  name: string;
  time_zone: string;
  now: Instant;
  latest_reading_at: Instant | null;
  readings: ReadingsState;
  plant_revision: number | null;
  window_s: number;
  imports_running: number;
  /** Days of readings that wait for evaluation, all lines together. */
  days_waiting: number;
  /** What the operator should know as long as it lasts. */
  notices: Notice[];
}

/** Something that the operator should know; at most one stands for a key. */
export interface Notice {
  key: string;
  since: Instant;
  sentence: string;
}

export interface Line {
  name: string;
  liquor: string;
  state: 'producing' | 'filling' | 'idle' | 'water run' | 'cleaning' | 'unknown';
  as_of: Instant | null;
  latest_reading_at: Instant | null;
  readings: ReadingsState;
  evaporation_kg_s: number | null;
  required_evaporation_kg_s: number | null;
  effects: Effect[];
}

export interface Effect {
  name: string;
  line: string;
  area_m2: number;
  clean_coefficient_w_m2k: number | null;
  now: HourResult | null;
  limits: Limits;
  due: Due;
  last_cleaning: Cleaning | null;
  cleaning_since: Instant | null;
  /** Fouling resistance at the end of each week since the last cleaning, oldest first, m²·K/W. */
  growth: number[];
  /** The surface that serves: the effect's own, or its bodies joined by +; null when not known. */
  surface: string | null;
  /** Its present campaign; null until that is computed. */
  campaign: Campaign | null;
}

/** The latest hour with a result. A number that could not be computed is null and `reason` says why. */
export interface HourResult {
  at: Instant;
  hours: number;
  coefficient_w_m2k: number | null;
  coefficient_u: number | null;
  coefficient_u_random: number | null;
  heating_temperature_c: number | null;
  boiling_temperature_c: number | null;
  elevation_k: number | null;
  driving_force_k: number | null;
  driving_force_u: number | null;
  /** With boiling at half the liquor's height; null without a level. */
  head_corrected_driving_force_k: number | null;
  head_corrected_driving_force_u: number | null;
  duty_kw: number | null;
  duty_u: number | null;
  heat_flux_kw_m2: number | null;
  cleanliness: number | null;
  cleanliness_u: number | null;
  /** May be negative: never clipped. */
  fouling_resistance_m2k_w: number | null;
  fouling_resistance_u: number | null;
  /** What the effect would do if clean at the conditions of this hour. */
  clean_coefficient_w_m2k: number | null;
  clean_coefficient_u: number | null;
  /** What the surface with this resistance would do at the reference conditions. */
  coefficient_at_reference_w_m2k: number | null;
  coefficient_at_reference_u: number | null;
  clean_from: string | null;
  duty_from: string | null;
  heating_temperature_from: string | null;
  boiling_temperature_from: string | null;
  reason: string | null;
}

export interface Limits {
  coefficient_w_m2k: number | null;
  cleanliness: number | null;
  hours_since_cleaning: number | null;
  /** The resistance at which the first of the coefficient and cleanliness limits is reached. */
  resistance_m2k_w: number | null;
}

export type DueState = 'due' | 'not due' | 'no limit' | 'unknown';

export interface Due {
  state: DueState;
  limit: string | null;
  since: Instant | null;
  sentence: string | null;
  evidence: Evidence[];
}

export interface Evidence {
  limit: string;
  value: number | null;
  bound: number | null;
  unit: string;
  state: DueState;
  since: Instant | null;
}

/** A line as places and the ways between them, with what is measured and computed there now. */
export interface FlowSheet {
  line: string;
  now: Instant;
  state: string;
  as_of: Instant | null;
  latest_reading_at: Instant | null;
  readings: ReadingsState;
  places: Place[];
  ways: Way[];
}

export type PlaceKind = 'effect' | 'steam' | 'feed' | 'product' | 'condenser' | 'condensate' | 'tank' | 'heater' | 'user' | 'flash vessel'
  | 'thermal recompressor' | 'mechanical recompressor' | 'motive steam';

export interface Place {
  id: string;
  kind: PlaceKind;
  name: string;
  measured: MeasuredNow[];
  effect: Effect | null;
  bodies: { name: string; area_m2: number; serving: boolean | null }[];
}

export type WayKind = 'steam' | 'vapour' | 'bleed' | 'motive' | 'liquor' | 'condensate';

export interface Way {
  from: string;
  to: string;
  kind: WayKind;
  share: number | null;
  share_u: number | null;
  /** Set where an instrument sees this way and no other. */
  flow: MeasuredNow | null;
  /** Its flow by the last balance; null where that cannot be told. `agrees`: whether the instrument on this way fits it, null without one. */
  balance: { value: number; standard: number; unit: string; as_of: Instant; agrees: boolean | null } | null;
}

export type FitState = 'fits' | 'does not fit' | 'left out' | 'not checked' | 'no reading';

/** How the readings of a signal fit those of the others. */
export interface Fit {
  state: FitState;
  /** The same as the end of a sentence, without its time. */
  words: string;
  since: Instant | null;
  /** What the others want to add to it, in `unit` and in standard uncertainties of the reading. */
  wanted: number | null;
  unit: string | null;
  wanted_in_standards: number | null;
  /** Signals of which one is wrong, this one among them. */
  one_of: string[];
  as_of: Instant;
}

export type VariableClass = 'checked by others' | 'follows from others' | 'cannot be told';

export interface BalanceVariable {
  variable: string;
  place: string;
  what: string;
  unit: string;
  measured: number | null;
  reconciled: number | null;
  standard: number | null;
  correction: number | null;
  correction_in_standards: number | null;
  class: VariableClass;
  signals: string[];
  suspicion: string | null;
}

/** The reconciled balance of a line in one window. */
export interface Balance {
  line: string;
  at: Instant;
  as_of: Instant;
  chi_square: number;
  degrees: number;
  chi_square_limit: number | null;
  fits: boolean | null;
  check: string;
  variables: BalanceVariable[];
  signals: { signal: string; fit: Fit }[];
  suspects: { signals: string[]; left_out: boolean; since: Instant; sentence: string }[];
  data_version: number;
}

/** What the balance wanted to add to the readings of a signal, as columns. */
export interface Corrections {
  signal: string;
  line: string;
  unit: string;
  step_s: number;
  start: Instant;
  offset_s: number[];
  wanted: (number | null)[];
  in_standards: (number | null)[];
  mark: ('' | 'left out' | 'not checked')[];
  data_version: number;
}

/** The last reading of an instrument at its place. */
export interface MeasuredNow {
  what: string;
  signal: string;
  value: number | null;
  unit: string;
  at: Instant | null;
  state: 'good' | 'uncertain' | 'bad' | 'stale' | 'none';
}

export const quantities = [
  'coefficient', 'clean_coefficient', 'cleanliness', 'fouling_resistance', 'coefficient_at_reference', 'driving_force', 'head_corrected_driving_force', 'duty',
  'heat_flux', 'heating_temperature', 'boiling_temperature', 'elevation', 'solids', 'feed_flow',
] as const;
export type Quantity = (typeof quantities)[number];

export type Mark = '' | 'extrapolated' | 'not producing';

/** A series as columns. A null value is a gap; `reason` indexes `reasons`, −1 for none. */
export interface Trend {
  line: string;
  effect: string;
  quantity: Quantity;
  unit: string;
  resolution: 'window' | 'hour';
  step_s: number;
  start: Instant;
  offset_s: number[];
  value: (number | null)[];
  u: (number | null)[];
  u_random: (number | null)[];
  mark: Mark[];
  /** Null: not judged. */
  steady: (boolean | null)[];
  reasons: string[];
  reason: number[];
  data_version: number;
}

/** A number with its standard uncertainty; both null when it is not known. */
export interface Uncertain {
  value: number | null;
  u: number | null;
}

/** How a cleaning is known; `rejected`: a person says that there was none. */
export type KnownBy = 'logged' | 'signal' | 'recognised' | 'rejected';

export interface Cleaning {
  /** Null for what nobody logged. */
  id: string | null;
  line: string;
  effect: string;
  /** The body that was cleaned, where the entry names one. */
  body: string | null;
  start: Instant;
  end: Instant | null;
  kind: string;
  note: string | null;
  logged_at: Instant | null;
  known_by: KnownBy;
  /** What it brought; null until that is computed. */
  result: CleaningResult | null;
}

export type Verdict = 'cleaned' | 'did not clean' | 'cannot be told' | 'awaiting hours';

/** What a cleaning brought. `left` is held against the best of the latest cleanings. */
export interface CleaningResult {
  surface: string;
  verdict: Verdict;
  /** Why it cannot be told, or what is awaited; empty otherwise. */
  reason: string;
  before_m2k_w: Uncertain;
  removed_m2k_w: Uncertain;
  left_m2k_w: Uncertain;
  removed_share: number | null;
  /** How sure it is that the coefficient rose, 0 to 1. */
  confidence: number | null;
}

/** A cleaning to log. Of a rejected one the kind may be empty and the end must be given. */
export interface NewCleaning {
  line: string;
  effect: string;
  start: Instant;
  end: Instant | null;
  kind: string;
  note: string;
  body?: string | null;
  rejected?: boolean;
}

/** The time between two cleanings of a surface. */
export interface Campaign {
  surface: string;
  start: Instant;
  end: Instant | null;
  started_by: 'first data' | 'logged' | 'signal' | 'recognised';
  confidence: number;
  products: string[];
  initial_resistance_m2k_w: Uncertain;
  final_resistance_m2k_w: Uncertain;
  removed_share: number | null;
  /** Growth in a day of production. */
  rate_m2k_w_per_day: Uncertain;
  production_hours: number;
  hours_since_cleaned: number;
}

/** A time out of production after which the surface was as before. */
export interface Stop {
  surface: string;
  start: Instant;
  end: Instant | null;
  reason: string;
}

/** A run on water: a test of the surface without solids or elevation. */
export interface WaterTest {
  surface: string;
  start: Instant;
  end: Instant;
  coefficient_w_m2k: Uncertain;
  resistance_since_previous_m2k_w: Uncertain;
}

/** What the effect would do if clean, as it is learnt for the present campaign and one product. */
export interface CleanReference {
  surface: string;
  product: string;
  since: Instant;
  source: string;
  coefficient_w_m2k: Uncertain;
  by_solids: Uncertain;
  by_boiling_temperature: Uncertain;
  by_heat_flux: Uncertain;
  /** Mass fraction; null when it does not follow them. */
  reference_solids: number | null;
  reference_boiling_temperature_c: number | null;
  reference_heat_flux_kw_m2: number | null;
}

/** Campaigns of the surfaces that served an effect, each list newest first. */
export interface Campaigns {
  line: string;
  effect: string;
  surface: string | null;
  campaigns: Campaign[];
  stops: Stop[];
  water_tests: WaterTest[];
  clean_references: CleanReference[];
  /** 0 before they were first computed. */
  version: number;
}

/** A signal of the plant file. Shares and counts are of the last 24 hours. */
export interface SignalRow {
  name: string;
  line: string | null;
  unit: string | null;
  latest_at: Instant | null;
  latest_value: number | null;
  latest_quality: string | null;
  /** Share of the time with a sound value, 0 to 1; null when there was no reading. */
  good_share: number | null;
  rejected: Rejected;
  readings: number;
  /** What the last balance of its line says of it; null when there is none. */
  fit: Fit | null;
  /** How it has changed against the others over the last weeks; null when it has not, or it cannot be told. */
  changed: { since: Instant; change: number; unit: string; words: string } | null;
}

/** What was logged of an instrument. */
export interface InstrumentEvent {
  id: string;
  signal: string;
  kind: InstrumentEventKind;
  start: Instant;
  end: Instant | null;
  note: string;
  logged_at: Instant;
}
export type InstrumentEventKind = 'instrument-excluded' | 'recalibration';

/** Readings that were not used, by what was wrong with them. */
export interface Rejected {
  bad: number;
  not_a_number: number;
  out_of_range: number;
  frozen: number;
}

export interface UnknownSignal {
  name: string;
  count: number;
  last_seen: Instant | null;
  source: string | null;
}

export interface Signals {
  as_of: Instant;
  signals: SignalRow[];
  unknown: UnknownSignal[];
}

/** A source of readings. Counts are since the service started. */
export interface Source {
  name: string;
  /** A broker that is read, the service's own one, or posted readings. */
  kind: 'mqtt' | 'broker' | 'http';
  address: string;
  connected_since: Instant | null;
  last_message_at: Instant | null;
  accepted: number;
  malformed: number;
  out_of_time: number;
  unknown: number;
  /** Kept messages without a time: when their value was true is not known. */
  instant_unknown: number;
  /** Messages without a promise of delivery, dropped because the intake was full. */
  shed: number;
  /** Times that it was told to come again later. */
  refused: number;
  reconnects: number;
  last_error: string | null;
  samples: { at: Instant; where: string; reason: string }[];
}

/** A reading that the database would not take. */
export interface RefusedReading {
  refused_at: Instant;
  signal: string;
  at: Instant;
  value: number | null;
  quality: string;
  source: string;
  reason: string;
}

export interface Sources {
  sources: Source[];
  /** What is on disk and not yet in the database. */
  spool: { bytes: number };
  /** Null while the database does not answer. */
  refused: RefusedReading[] | null;
}

export type ImportState = 'waiting' | 'running' | 'done' | 'failed' | 'cancelled';

export interface Import {
  id: string;
  name: string;
  state: ImportState;
  bytes_total: number;
  bytes_read: number;
  rows: number;
  accepted: number;
  repeated: number;
  differing: number;
  rejected: number;
  not_in_plant: number;
  rows_per_s: number | null;
  seconds_left: number | null;
  started_at: Instant | null;
  ended_at: Instant | null;
  error: string | null;
  problems: { line: number; reason: string }[];
  unknown_signals: { name: string; count: number }[];
}

export interface PlantRevision {
  revision: number;
  accepted_at: Instant;
  in_force_from: Instant | null;
  author: string | null;
  text: string;
}

/** An accepted plant file without its text. */
export interface Revision {
  revision: number;
  accepted_at: Instant;
  in_force_from: Instant;
  in_force_until: Instant | null;
  state: 'in force' | 'past' | 'coming' | 'replaced';
  replaced_by: number | null;
  author: string;
  sha256: string;
  /** Days of lines whose shown results were computed under it. */
  days_computed: number;
}

export interface DifferentLine { change: 'same' | 'added' | 'removed'; from_line: number | null; to_line: number | null; text: string }

/** How a plant file differs from another, line by line. */
export interface Differences { from: number; to: number; added: number; removed: number; stretches: { lines: DifferentLine[] }[] }

/** Days computed anew though none of their readings changed. */
export interface Recomputation {
  id: number;
  cause: 'plant revision' | 'older model' | 'asked';
  why: string;
  revision: number | null;
  line: string | null;
  /** First and last UTC day, 2026-03-01. */
  from: string;
  to: string;
  days_total: number;
  days_done: number;
  days_left: number;
  state: 'running' | 'done' | 'cancelled';
  days_per_minute: number | null;
  seconds_left: number | null;
  started_at: Instant;
  ended_at: Instant | null;
  author: string;
}

export interface AcceptedRevision { revision: Revision; is_new: boolean; recomputation: Recomputation | null }

/** What is wrong in a plant file, and where. */
export interface PlantProblem { line: number; column: number; path: string; found: string; allowed: string }

/** Problem details, RFC 9457. */
export interface Problem {
  title?: string;
  detail?: string;
  status?: number;
  errors?: Record<string, string[]>;
  /** Of a plant file: every mistake. */
  problems?: PlantProblem[];
}
