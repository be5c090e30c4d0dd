import { AppError } from '../../app/errors.ts';

/** The `AppError` a call throws; fails when it throws nothing or something else. */
export function appFailure(run: () => unknown): AppError {
  try {
    run();
  } catch (error) {
    if (error instanceof AppError) return error;
    throw error;
  }
  throw new Error('nothing was thrown');
}
