/** Hands text or bytes to the browser as a download. */
export function saveFile(name: string, content: string | Blob, type = 'text/plain'): void {
  const blob = typeof content === 'string' ? new Blob([content], { type: `${type};charset=utf-8` }) : content;
  const url = URL.createObjectURL(blob);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // The download has its own hold on the blob once the click was handled.
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}

/** A file name from plain words: "Accuracy of run 3" → "accuracy-of-run-3". */
export function fileNameOf(words: string): string {
  const name = words
    .normalize('NFKD')
    .replace(/[^\p{Letter}\p{Number}]+/gu, '-')
    .replace(/^-+|-+$/g, '')
    .toLowerCase();
  return name || 'groundsel';
}
