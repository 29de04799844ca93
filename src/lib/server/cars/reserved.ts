/** Columns of a pass file that are not adjustables; a key of the same name could not be told apart from them. */
export const CONDITION_COLUMNS: ReadonlySet<string> = new Set(
  `pass_no event track date_time round lane air_temp_f air_temp_c relative_humidity_pct dew_point_f dew_point_c wet_bulb_f
  wet_bulb_c station_pressure_inhg station_pressure_hpa station_pressure_kpa altimeter_inhg altimeter_hpa altimeter_kpa
  altitude_ft altitude_m track_temp_f track_temp_c wind_mph wind_kmh wind_dir_deg cloud_pct runs_on_discs slip_pct sixty_ft_s
  three_thirty_ft_s eighth_s eighth_mph eighth_kmh thousand_ft_s quarter_s quarter_mph quarter_kmh outcome notes excluded
  excluded_reason`.split(/\s+/),
);
