interface Caller {
  request: Request;
  clientAddress: string;
}

/**
 * The caller's address for limits, or null when it cannot be known. X-Forwarded-For is anybody's word unless TRUST_PROXY says that
 * a proxy of ours writes it; the framework takes it as it comes.
 */
export function callerAddress(call: Caller, env: Record<string, string | undefined> = process.env): string | null {
  if (!isTrue(env.TRUST_PROXY) && call.request.headers.has('x-forwarded-for')) return null;
  try {
    return call.clientAddress || null;
  } catch {
    return null;
  }
}

const isTrue = (value: string | undefined): boolean => value === '1' || value?.toLowerCase() === 'true';
