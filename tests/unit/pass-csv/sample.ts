import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import { type ParsedPassFile, parsePassCsv } from '@/lib/pass-csv';

export const HEADER =
  'pass_no,event,track,date_time,round,lane,air_temp_f,relative_humidity_pct,station_pressure_inhg,altitude_ft,track_temp_f,wind_mph,wind_dir_deg,counterweight_g,base_pressure_lb,release_delay_s,launch_rpm,tire_pressure_psi,runs_on_discs,slip_pct,sixty_ft_s,three_thirty_ft_s,eighth_s,eighth_mph,outcome,notes';

export const ROW_1 =
  '1,Spring Open,Testing Flats,2026-03-14T14:05:00-06:00,Q1,left,77,45,28.86,1000,104,5,270,11.5,240,0.52,7400,6.8,2,15.4,0.842,2.12,3.05,285.5,clean,calm';

/** The header, one good row, and changes to it by column name. */
export function fileWith(changes: Readonly<Record<string, string>> = {}, header = HEADER): string {
  const names = header.split(',');
  const base = new Map(HEADER.split(',').map((name, index) => [name, ROW_1.split(',')[index] ?? '']));
  return `${header}\n${names.map((name) => changes[name] ?? base.get(name) ?? '').join(',')}\n`;
}

export const parse = (text: string): ParsedPassFile => parsePassCsv(text, DEFAULT_ADJUSTABLES);
export const parseWith = (changes: Readonly<Record<string, string>>): ParsedPassFile => parse(fileWith(changes));

/** The one row of a file that must have been read without refusal. */
export function onlyRow(parsed: ParsedPassFile) {
  if (parsed.fileError || parsed.refused.length > 0 || parsed.rows.length !== 1) {
    throw new Error(`Expected one good row: ${JSON.stringify(parsed)}`);
  }
  return parsed.rows[0]!;
}
