import type { Confidence } from '../../../../shared/contracts/sample.ts';

export const CONFIDENCE_TEXT: Record<Confidence, string> = { low: 'Low', medium: 'Medium', high: 'High' };
