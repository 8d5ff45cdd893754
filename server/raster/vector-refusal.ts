/** A vector file that cannot be used; the message says what was found. */
export class VectorRefusal extends Error {
  override readonly name = 'VectorRefusal';
}
