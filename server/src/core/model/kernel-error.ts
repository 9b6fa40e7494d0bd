/** A kernel that physics or arithmetic rules out (`value`), or that this tool cannot turn into a matrix element (`not-evaluated`). */
export class KernelError extends Error {
  constructor(
    readonly code: 'value' | 'not-evaluated',
    message: string,
  ) {
    super(message);
    this.name = 'KernelError';
  }
}
