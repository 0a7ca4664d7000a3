// An invented site. Everything here is made up and always the same: pictures of the dashboard can be compared.
export const start = Date.parse('2026-11-30T13:32:00Z');
const day = 86_400_000;

/** Each effect: clean coefficient, its fall per day, when it was cleaned, its limits, temperatures. */
export const plant = [
  {
    name: 'north', liquor: 'juice', stale: 0, evaporation: 33.4, required: 33.1, effects: [
      { name: 'N1', clean: 2900, rate: 0.0042, residual: 0.02, cleaned: 24, floor: 1700, share: null, hours: 900, Ts: 108.9, force: 11.7, elevation: 0.7, area: 1450, duty: 36500 },
      { name: 'N2', clean: 2500, rate: 0.0068, residual: 0.03, cleaned: 24, floor: 1600, share: null, hours: 900, Ts: 96.1, force: 7.1, elevation: 1.0, area: 1300, duty: 19200 },
      { name: 'N3', clean: 1900, rate: 0.0031, residual: 0.06, cleaned: 24, floor: 1200, share: 0.6, hours: 900, Ts: 87.6, force: 9.3, elevation: 1.5, area: 1300, duty: 19600 },
      { name: 'N4', clean: 960, rate: 0.0135, residual: 0.05, cleaned: 27, floor: 690, share: null, hours: 600, Ts: 76.3, force: 16.9, elevation: 3.4, area: 1300, duty: 16000 },
    ],
  },
  {
    name: 'south', liquor: 'juice', stale: 3.4 * 3_600_000, evaporation: 16.1, required: 13.3, effects: [
      { name: 'S1', clean: 2700, rate: 0.003, residual: 0.02, cleaned: 18, floor: 1800, share: null, hours: null, Ts: 107.1, force: 12.2, elevation: 0.6, area: 900, duty: 21400 },
      { name: 'S2', clean: 2100, rate: 0.0049, residual: 0.03, cleaned: 18, floor: 1400, share: null, hours: null, Ts: 94.3, force: 10.4, elevation: 1.1, area: 900, duty: 16900 },
      { name: 'S3', clean: 1150, rate: 0.001, residual: 0, cleaned: 3, floor: null, share: null, hours: null, Ts: 82.8, force: 19.7, elevation: 3.1, area: 900, duty: 19300 },
    ],
  },
  {
    name: 'blend', liquor: 'mixed', stale: 0, evaporation: null, required: 6.4, effects: [
      { name: 'B1', clean: 1800, rate: 0.0029, residual: 0.01, cleaned: 10, floor: 1300, share: 0.7, hours: null, Ts: 104.4, force: 13.1, elevation: 0.9, area: 420, duty: 9100 },
      { name: 'B2', clean: 1400, rate: 0.02, residual: 0.02, cleaned: 40, floor: 1150, share: null, hours: null, Ts: 90.2, force: 15.4, elevation: 2.0, area: 420, duty: 7300, unknown: 'chest pressure N.PT-1 and chest temperature are absent since Sunday' },
      { name: 'B3', clean: 1000, rate: 0.004, residual: 0.02, cleaned: 40, floor: 800, share: null, hours: null, Ts: 77.5, force: 17.2, elevation: 3.9, area: 420, duty: 6100, cleaning: 2.5 },
    ],
  },
];

/** Forty lines, some silent, few that ask. */
const many = [...plant, ...Array.from({ length: 37 }, (_, at) => {
  const i = at + 4, like = plant[1], ask = i % 9 === 0;
  return { ...like, name: `L${i}`, stale: i % 13 === 0 ? like.stale : 0, effects: [...like.effects, ...like.effects].map((e, k) => ({ ...e, name: `L${i}-${k + 1}`, rate: e.rate * (1 + (i % 5) * 0.6), floor: ask && k === 1 ? 1950 : k % 3 === 2 ? 500 : e.floor && 900 })) };
})];

/** Sites by size; the port that is asked chooses. */
export const sizes = { few: plant, many, one: plant.slice(0, 1) };

export const cleanings = many.flatMap(l => l.effects.flatMap(e => [0, 28, 57].map((back, i) => ({
  id: `c-${e.name}-${i}`, line: l.name, effect: e.name,
  start: new Date(start - (e.cleaned + back) * day - 9 * 3_600_000).toISOString(), end: new Date(start - (e.cleaned + back) * day).toISOString(),
  kind: ['chemical', 'chemical', 'rinse'][i], note: i === 1 ? 'caustic 4 %, then rinse; <b>not markup</b>' : '', logged_at: new Date(start - (e.cleaned + back) * day + 3_600_000).toISOString(),
}))));
for (const l of plant) for (const e of l.effects) if (e.cleaning) {
  cleanings.push({ id: `c-${e.name}-now`, line: l.name, effect: e.name, start: new Date(start - e.cleaning * 3_600_000).toISOString(), end: null, kind: 'boil-out', note: '', logged_at: new Date(start).toISOString() });
}

export const plantText = `site: Fennholm
time-zone: Europe/Copenhagen
window: 5 min
lines:
  north:
    liquor: juice
    effects:
${plant[0].effects.map(e => `      - {name: ${e.name}, area: ${e.area} m2, clean-coefficient: ${e.clean} W/(m2.K), due-when: {coefficient-below: ${e.floor} W/(m2.K)}}`).join('\n')}
`;
