import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { api } from '@/components/islands/api';
import type { Forecast, Settings } from '@/lib/domain/types';
import { useLater } from './useLater';

/** The answer of POST /api/suggestions/:id/forecast. */
export interface ForecastAnswer {
  forecast: Forecast | null;
  /** False when the passes are no longer those of the suggestion. */
  asSuggested: boolean;
  warnings: string[];
}

export interface AskedForecast {
  answer: ForecastAnswer | undefined;
  error: Error | null;
  /** True while what is shown is not yet for the settings as typed. */
  busy: boolean;
}

const WAIT_MS = 300;

/** The forecast for settings moved by hand, asked of the server shortly after the last change. Null settings ask nothing. */
export function useForecast(suggestionId: string, settings: Settings | null, enabled: boolean): AskedForecast {
  const asked = useLater(settings, WAIT_MS);
  const { data, error, isFetching } = useQuery({
    queryKey: ['forecast', suggestionId, asked],
    queryFn: ({ signal }) =>
      api<ForecastAnswer>(`/api/suggestions/${suggestionId}/forecast`, { body: { settings: asked }, signal }),
    enabled: enabled && asked !== null,
    placeholderData: keepPreviousData,
  });
  return { answer: data, error, busy: isFetching || asked !== settings };
}
