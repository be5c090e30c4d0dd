/** One measured thing; `ratio` is against the plain way, where there is one. */
export interface BenchResult {
  readonly name: string;
  readonly seconds: number;
  readonly ratio?: number;
  readonly peakMb: number;
  readonly detail: Readonly<Record<string, number | string>>;
}
