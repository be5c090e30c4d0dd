/**
 * The retarded part (e^(−jkR) − 1)/R of the kernel between centres, 1/m; −jk at R = 0. Free of cancellation for small kR.
 */
export const retardedRe = (kPerM: number, distanceM: number): number => {
  if (distanceM === 0) return 0;
  const half = Math.sin((kPerM * distanceM) / 2);
  return (-2 * half * half) / distanceM;
};
export const retardedIm = (kPerM: number, distanceM: number): number =>
  distanceM === 0 ? -kPerM : -Math.sin(kPerM * distanceM) / distanceM;
