import { useState } from 'react';
import { z } from 'zod';
import type { BandLimits } from '../../lib/scene-view.ts';

const storedSchema = z.record(z.coerce.number().int(), z.object({ low: z.number(), high: z.number() }));

/** Stretch limits set by hand on a scene's histograms, kept in this browser for next time. */
export function useBandLimits(sceneId: string): [BandLimits, (limits: BandLimits) => void] {
  const key = `groundsel.limits.${sceneId}`;
  const [limits, setLimits] = useState<BandLimits>(() => readLimits(key));
  const change = (next: BandLimits) => {
    setLimits(next);
    if (Object.keys(next).length > 0) localStorage.setItem(key, JSON.stringify(next));
    else localStorage.removeItem(key);
  };
  return [limits, change];
}

function readLimits(key: string): BandLimits {
  const text = localStorage.getItem(key);
  if (!text) return {};
  try {
    const parsed = storedSchema.safeParse(JSON.parse(text));
    return parsed.success ? parsed.data : {};
  } catch {
    // Text of another hand: percentiles lose nothing.
    return {};
  }
}
