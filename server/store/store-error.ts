/** What the store cannot do, said in a sentence that a person at the console can act on. */
export class StoreError extends Error {
  override readonly name = 'StoreError';
}
