/** How a failure is told: the code decides the exit code and what the user can do about it. */
export type ErrorCode = 'input' | 'file' | 'newer-project' | 'busy' | 'cancelled' | 'internal';

/** A failure with words for the user: what happened, where, what must be, what came. */
export class AppError extends Error {
  override readonly name = 'AppError';
  readonly code: ErrorCode;
  /** Place in the input, for example `nets[3].traces[0].widthMm`. */
  readonly path: string | undefined;

  constructor(code: ErrorCode, message: string, path?: string, options?: ErrorOptions) {
    super(message, options);
    this.code = code;
    this.path = path;
  }
}

/** Wrong input: `path` must be `must`; received `received`. */
export const inputError = (path: string, must: string, received: unknown): AppError =>
  new AppError('input', `${path} must be ${must}; received ${describe(received)}`, path);

/** A file that cannot be read, written or understood. */
export const fileError = (file: string, message: string, options?: ErrorOptions): AppError =>
  new AppError('file', `${file}: ${message}`, file, options);

/** Short, safe text of a received value (hostile strings are cut and control characters escaped). */
export function describe(value: unknown): string {
  if (value === undefined) return 'nothing';
  const text = typeof value === 'string' ? JSON.stringify(value) : (JSON.stringify(value) ?? String(value));
  return text.length > 120 ? `${text.slice(0, 117)}…` : text;
}

/** A limit of the model that applies to a result: data, never an error and never silence. */
export interface Caveat {
  /** Stable kebab-case code. */
  readonly code: string;
  readonly message: string;
  /** Net, layer, cable or place it concerns; empty when it concerns the whole result. */
  readonly where: string;
  readonly fromHz: number;
  /** Upper end of the range; 0 for both means: at every frequency. */
  readonly toHz: number;
}
