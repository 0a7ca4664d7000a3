import { start } from './plant.mjs';

const iso = t => new Date(t).toISOString();
const none = { bad: 0, not_a_number: 0, out_of_range: 0, frozen: 0 };
const fits = { state: 'fits', words: 'fits the others', since: null, wanted: 0.004, unit: 'bar', wanted_in_standards: 0.4, one_of: [] };
const sound = (name, line, unit, at, value) => ({ name, line, unit, latest_at: at, latest_value: value, latest_quality: 'good', good_share: 0.9986, rejected: none, readings: 17_280, changed: null, fit: line === null ? null : { ...fits, as_of: at } });

/** Signals as the interface answers them: most sound, and each way to be unsound once. */
export function signals(plant, now) {
  const rows = plant.flatMap(l => {
    const at = iso(l.stale ? start - l.stale : now - 3000);
    return l.effects.flatMap((e, i) => {
      const p = sound(`${e.name}.PT-1`, l.name, 'bar', at, 1.4 - 0.3 * i), t = sound(`${e.name}.TT-2`, l.name, 'degC', at, e.Ts - e.force);
      if (e.unknown) Object.assign(t, { latest_at: null, latest_value: null, latest_quality: null, good_share: null, readings: 0 });
      if (e.name === 'N2') Object.assign(t, { latest_quality: 'bad', latest_value: null, good_share: 0.71, rejected: { bad: 4980, not_a_number: 12, out_of_range: 0, frozen: 0 } });
      if (e.name === 'N3') Object.assign(p, { good_share: 0.42, rejected: { bad: 0, not_a_number: 0, out_of_range: 3, frozen: 10_020 } });
      if (e.name === 'N4') Object.assign(p, { fit: { ...p.fit, state: 'does not fit', words: 'does not fit the others: the others want +0.036 bar (6.2 standard uncertainties)', since: iso(start - 5_400_000), wanted: 0.036, wanted_in_standards: 6.2 } });
      if (e.name === 'N4') Object.assign(t, { latest_quality: 'uncertain' });
      return [p, t];
    });
  });
  rows.push(sound('COND.PT-9', null, 'mbar', iso(now - 3000), 118));
  return { as_of: iso(now), signals: rows, unknown: [{ name: 'N9.XT-7', count: 1840, last_seen: iso(now - 60_000), source: 'gateway' }, { name: 'spare/channel/with/a/long/topic/name/17', count: 2, last_seen: iso(now - 7_200_000), source: 'gateway' }] };
}

/** Sources: one that works, one that is cut, the service's own broker, posted readings. */
export function sources(now) {
  const counts = { accepted: 0, malformed: 0, out_of_time: 0, unknown: 0, instant_unknown: 0, shed: 0, refused: 0, reconnects: 0, last_error: null, samples: [] };
  return {
    sources: [
      { ...counts, name: 'gateway', kind: 'mqtt', address: 'gateway.example:8883', connected_since: iso(start - 7 * 3_600_000), last_message_at: iso(now - 2000), accepted: 81_234 + Math.floor((now - start) / 100), malformed: 2, unknown: 1842,
        instant_unknown: 1, shed: 40, reconnects: 3, last_error: 'The connection was closed by the other side at 2026-11-30T06:31:02Z.',
        samples: [{ at: iso(start - 9_000_000), where: 'plant/north/fi10', reason: "the text 'n/a' is not a number" }, { at: iso(start - 8_000_000), where: 'plant/<b>north</b>/fi10', reason: 'the object has no member value' }] },
      { ...counts, name: 'old-gateway', kind: 'mqtt', address: 'old-gateway.example:1883', connected_since: null, last_message_at: iso(start - 3.4 * 3_600_000), accepted: 4410, last_error: 'No host answers at old-gateway.example:1883.' },
      { ...counts, name: 'own broker', kind: 'broker', address: 'port 1883', connected_since: iso(start - 30 * 3_600_000), last_message_at: null },
      { ...counts, name: 'posted', kind: 'http', address: '/api/v1/readings', connected_since: null, last_message_at: iso(now - 4_000_000), accepted: 120, refused: 2, out_of_time: 7 },
    ],
    spool: { bytes: 40_960 },
    refused: [{ refused_at: iso(start - 5_000_000), signal: 'N1.PT-1', at: iso(start - 5_003_000), value: 1.2, quality: 'good', source: 'gateway', reason: 'the instant lies outside the history that is kept' }],
  };
}

/** Notices: one that asks for an act, one that is to be known. */
export const notices = [
  { key: 'source:old-gateway', since: iso(start - 3.4 * 3_600_000), sentence: 'The MQTT broker old-gateway at old-gateway.example:1883 is not connected: no host answers. What it sends with an acknowledgement waits there.' },
  { key: 'spool-full', since: iso(start - 720_000), sentence: 'The spool is full. Readings are refused until there is room.' },
];
