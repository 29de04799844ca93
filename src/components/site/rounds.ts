import type { Lane } from '@/lib/domain/types';

const LANE_TEXT: Record<Lane, string> = { left: 'left lane', right: 'right lane' };

export const laneText = (lane: Lane | null): string => (lane ? LANE_TEXT[lane] : 'lane not drawn');
