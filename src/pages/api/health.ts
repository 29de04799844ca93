import { health } from '@/lib/server/health';
import { json } from '@/lib/server/http';

export const GET = async (): Promise<Response> => {
  const state = await health();
  return json(state, state.ok ? 200 : 503);
};
