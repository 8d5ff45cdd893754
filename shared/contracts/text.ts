import { z } from 'zod';

/** Half a pair of UTF-16, what no XML document may hold, and marks that turn the writing direction of what follows. */
const UNPRINTABLE = /\p{Cs}|[\ufffe\uffff\u202a-\u202e\u2066-\u2069]/gu;
const CONTROL = /\p{Cc}/gu;
const CONTROL_BUT_BREAKS = /(?![\n\t])\p{Cc}/gu;

/** A name as it can stand on a page, in a file and in a letter: one line without control characters. */
export function cleanLine(text: string): string {
  return text
    .replace(/\s*[\r\n\t\u2028\u2029]\s*/g, ' ')
    .replace(CONTROL, '')
    .replace(UNPRINTABLE, '')
    .trim();
}

/** Text of several lines without other control characters; lines end in a line feed. */
export function cleanText(text: string): string {
  return text.replace(/\r\n?/g, '\n').replace(CONTROL_BUT_BREAKS, '').replace(UNPRINTABLE, '').trim();
}

/** A name, cleaned before its length is looked at. */
export function lineSchema(maxLength: number) {
  return z.string().overwrite(cleanLine).max(maxLength);
}

/** A note or a definition, cleaned before its length is looked at. */
export function textSchema(maxLength: number) {
  return z.string().overwrite(cleanText).max(maxLength);
}
