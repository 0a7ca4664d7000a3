// Invented plant revisions and recomputations.
export const revisions = [
  { revision: 3, accepted_at: '2026-10-02T08:11:00Z', in_force_from: '2026-10-01T00:00:00Z', in_force_until: null, state: 'in force', replaced_by: null, author: 'k.olm', sha256: '', days_computed: 180 },
  { revision: 2, accepted_at: '2026-09-02T08:11:00Z', in_force_from: '2026-06-30T22:00:00Z', in_force_until: '2026-10-01T00:00:00Z', state: 'past', replaced_by: null, author: 'k.olm', sha256: '', days_computed: 276 },
  { revision: 1, accepted_at: '2026-07-01T06:00:00Z', in_force_from: '2026-06-30T22:00:00Z', in_force_until: null, state: 'replaced', replaced_by: 2, author: 'k.olm', sha256: '', days_computed: 0 },
];
export const differences = { from: 2, to: 3, added: 1, removed: 1, stretches: [{ lines: [
  { change: 'same', from_line: 30, to_line: 30, text: '        liquor: feed' }, { change: 'removed', from_line: 31, to_line: null, text: '        area: 1450 m2' },
  { change: 'added', from_line: null, to_line: 31, text: '        area: 1520 m2' }, { change: 'same', from_line: 32, to_line: 32, text: '        clean-coefficient: 2900 W/(m2.K)' }] }] };
export const recomputations = [
  { id: 2, cause: 'plant revision', why: 'Plant revision 3 was accepted.', revision: 3, line: null, from: '2026-10-01', to: '2026-11-30', days_total: 183, days_done: 61, days_left: 122, state: 'running',
    days_per_minute: 240, seconds_left: 31, started_at: '2026-11-30T13:30:00Z', ended_at: null, author: 'k.olm' },
  { id: 1, cause: 'asked', why: 'Asked for by k.olm.', revision: null, line: 'north', from: '2026-07-01', to: '2026-08-31', days_total: 62, days_done: 20, days_left: 42, state: 'cancelled',
    days_per_minute: null, seconds_left: null, started_at: '2026-09-03T09:00:00Z', ended_at: '2026-09-03T09:01:00Z', author: 'k.olm' },
];
