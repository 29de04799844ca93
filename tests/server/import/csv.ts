/** Pass files for tests: a header and rows by column name; columns that are not named are blank. */

export const COLUMNS = [
  'pass_no',
  'event',
  'track',
  'date_time',
  'round',
  'lane',
  'air_temp_f',
  'relative_humidity_pct',
  'station_pressure_inhg',
  'altitude_ft',
  'track_temp_f',
  'wind_mph',
  'wind_dir_deg',
  'counterweight_g',
  'base_pressure_lb',
  'release_delay_s',
  'launch_rpm',
  'tire_pressure_psi',
  'runs_on_discs',
  'slip_pct',
  'sixty_ft_s',
  'three_thirty_ft_s',
  'eighth_s',
  'eighth_mph',
  'outcome',
  'notes',
] as const;

export type Cells = Partial<Record<string, string | number>>;

const TYPICAL: Cells = {
  event: 'Spring Meet',
  track: 'Mesa Flats',
  round: 'Q1',
  lane: 'left',
  air_temp_f: 72,
  relative_humidity_pct: 30,
  station_pressure_inhg: 24.9,
  altitude_ft: 4980,
  track_temp_f: 95,
  wind_mph: 5,
  wind_dir_deg: 200,
  counterweight_g: 11,
  base_pressure_lb: 200,
  release_delay_s: 0.4,
  launch_rpm: 7200,
  tire_pressure_psi: 6,
  runs_on_discs: 2,
  slip_pct: 15,
  sixty_ft_s: 0.91,
  three_thirty_ft_s: 2.3,
  eighth_s: 3.4,
  eighth_mph: 205,
  outcome: 'clean',
  notes: '',
};

/** One ordinary pass; each number is an hour later than the one before. */
export function cells(passNo: number, change: Cells = {}): Cells {
  const at = new Date(Date.UTC(2025, 3, 11, 15 + passNo)).toISOString().slice(0, 19);
  return { ...TYPICAL, pass_no: passNo, date_time: `${at}-06:00`, ...change };
}

export function csv(rows: readonly Cells[], columns: readonly string[] = COLUMNS, delimiter = ','): string {
  const line = (values: readonly unknown[]) =>
    values.map((value) => quoted(String(value ?? ''), delimiter)).join(delimiter);
  return `${[line(columns), ...rows.map((row) => line(columns.map((name) => row[name])))].join('\n')}\n`;
}

const quoted = (cell: string, delimiter: string): string =>
  cell.includes(delimiter) || /["\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;

/** A season that varies: several events, tracks, rounds and conditions, the same on every call. */
export function seasonCells(count: number): Cells[] {
  return Array.from({ length: count }, (_, i) => {
    const event = Math.floor(i / 8);
    const wave = Math.sin(i * 1.7);
    return cells(i + 1, {
      event: `Meet ${event}`,
      track: ['Mesa Flats', 'Pine Hollow', 'Lakeside'][event % 3] as string,
      altitude_ft: [4980, 820, 300][event % 3] as number,
      station_pressure_inhg: [24.9, 29, 29.5][event % 3] as number,
      date_time: seasonTime(event, i % 8),
      round: `Q${(i % 8) + 1}`,
      lane: i % 2 ? 'left' : 'right',
      track_temp_f: Math.round(95 + 18 * wave),
      counterweight_g: 10 + (i % 5) * 0.5,
      launch_rpm: 7000 + (i % 4) * 100,
      slip_pct: Math.round((15 + 2 * wave + (i % 5) * 0.4) * 100) / 100,
      runs_on_discs: i % 4,
    });
  });
}

function seasonTime(event: number, run: number): string {
  const start = Date.UTC(2016, 0, 9, 9) + event * 2 * 86_400_000;
  return `${new Date(start + run * 3_600_000).toISOString().slice(0, 19)}-07:00`;
}
