/**
 * Classes of a run with their place in the scheme, which gives their pattern; a class that left the scheme takes its
 * place in the run.
 */
export function withPositions<C extends { id: string }>(
  classes: readonly C[],
  scheme: readonly { id: string; position: number }[],
): (C & { position: number })[] {
  const positions = new Map(scheme.map(({ id, position }) => [id, position]));
  return classes.map((one, index) => ({ ...one, position: positions.get(one.id) ?? index }));
}
