/** Content that a project's tables promise, and that is not there or not what was written. */
export class DamagedDocument extends Error {
  override readonly name = 'DamagedDocument';
}
