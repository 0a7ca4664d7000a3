import type { Effect, FlowSheet, Place } from '../api/types';

/** How the temperature falls over one effect, K and °C. Null is not known. */
export interface Fall {
  id: string;
  effect: Effect;
  bodies: Place['bodies'];
  /** Saturation temperature in the chest, °C. */
  heating: number | null;
  boiling: number | null;
  /** From the chest to the boiling liquor, with its standard uncertainty. */
  drive: number | null;
  driveU: number | null;
  /** What a clean wall would need at this heat flux, and what the deposit takes: together the drive. Scale is negative where the wall does better than its clean value. */
  clean: number | null;
  scale: number | null;
  scaleU: number | null;
  elevation: number | null;
  /** Where its vapour condenses, °C. */
  condensing: number | null;
  /** From there to the chest that it heats; the largest where it heats several. Negative where that chest reads hotter. */
  loss: number | null;
  /** True where the chest has no gauge, so that the loss is what the plant file states. */
  lossStated: boolean;
  /** Why there is no coefficient; null when there is one. */
  reason: string | null;
}

/** What a recompressor lifts vapour by, from where it condenses to the chest. */
export interface Lift { id: string; from: number | null; to: number | null; lift: number | null }

const minus = (a: number | null, b: number | null) => (a === null || b === null ? null : a - b);

/** The fall over every effect. The parts add up exactly: heating − clean − scale = boiling, − elevation = condensing, − loss = the next heating. */
export function fallsOf(sheet: Pick<FlowSheet, 'places' | 'ways'>): Map<string, Fall> {
  const falls = new Map<string, Fall>();
  for (const { id, effect, bodies } of sheet.places) {
    if (effect === null) continue;
    const n = effect.now, heating = n?.heating_temperature_c ?? null, boiling = n?.boiling_temperature_c ?? null, elevation = n?.elevation_k ?? null;
    const drive = minus(heating, boiling), share = n?.coefficient_w_m2k == null ? null : n.cleanliness;
    // Heat flux times 1/U_clean is the drive times U/U_clean: the same kelvins without rounding between them.
    const clean = drive === null || share === null ? null : drive * share;
    falls.set(id, {
      id, effect, bodies, heating, boiling, drive, driveU: n?.driving_force_u ?? null, clean, scale: minus(drive, clean), scaleU: clean === null || n?.cleanliness_u == null ? null : drive! * n.cleanliness_u,
      elevation, condensing: minus(boiling, elevation), loss: null, lossStated: false,
      reason: n?.coefficient_w_m2k != null ? null : effect.cleaning_since !== null ? 'it is being cleaned' : n?.reason ?? (n === null ? 'no hour has a result yet' : 'the reason was not given'),
    });
  }
  for (const w of sheet.ways) {
    const from = falls.get(w.from), to = falls.get(w.to);
    if (w.kind !== 'vapour' || !from || !to) continue;
    const loss = minus(from.condensing, to.heating);
    if (loss === null || (from.loss !== null && loss <= from.loss)) continue;
    from.loss = loss;
    from.lossStated = to.effect.now?.heating_temperature_from === 'vapour pressure of what heats it';
  }
  return falls;
}

/** What each recompressor lifts. */
export function liftsOf(sheet: Pick<FlowSheet, 'places' | 'ways'>, falls: Map<string, Fall>): Map<string, Lift> {
  return new Map(sheet.places.filter(p => p.kind.endsWith('recompressor')).map(({ id }) => {
    const suction = sheet.ways.find(w => w.to === id && falls.has(w.from)), chest = sheet.ways.find(w => w.from === id && falls.has(w.to));
    const from = suction ? falls.get(suction.from)!.condensing : null, to = chest ? falls.get(chest.to)!.heating : null;
    return [id, { id, from, to, lift: minus(to, from) }];
  }));
}
