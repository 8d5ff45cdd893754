/** What a refused figure is told, where the shared contract has no words of its own. */
export function describeIssue(issue: {
  code?: string;
  expected?: unknown;
  minimum?: unknown;
  maximum?: unknown;
}): string | undefined {
  if (issue.code === 'invalid_type' && issue.expected === 'int') return 'A whole number is wanted.';
  if (issue.code === 'invalid_type' && issue.expected === 'number') return 'A number is wanted.';
  if (issue.code === 'too_small' && typeof issue.minimum === 'number') return `At least ${issue.minimum}.`;
  if (issue.code === 'too_big' && typeof issue.maximum === 'number') return `At most ${issue.maximum}.`;
  return undefined;
}
