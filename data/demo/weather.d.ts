export type DemoWeather = {
  day: string;
  tmaxF: number | null;
  tminF: number | null;
  snowfallIn: number | null;
  snowDepthIn: number | null;
  precipIn: number | null;
  isTrace: boolean;
};

export type WeatherDayRow = {
  station_id: number;
  day: string;
  tmax_f: number | null;
  tmin_f: number | null;
  snowfall_in: number | null;
  snow_depth_in: number | null;
  precip_in: number | null;
  has_trace_snowfall: 0 | 1;
  has_trace_depth: 0 | 1;
  source: string;
  fetched_at: string;
};

export const demoStations: readonly { id: number; code: string; name: string; district: string }[];
export function makeWeatherDays(seed: number): WeatherDayRow[];
export function stationSeason(seed: number, code: string, year: number): DemoWeather[];
