/** The only place with unit factors: everything inside the program is SI. */

export const mmToM = (lengthMm: number): number => lengthMm * 1e-3;
export const mToMm = (lengthM: number): number => lengthM * 1e3;
export const mhzToHz = (frequencyMhz: number): number => frequencyMhz * 1e6;
export const hzToMhz = (frequencyHz: number): number => frequencyHz * 1e-6;
export const nsToS = (timeNs: number): number => timeNs * 1e-9;
export const sToNs = (timeS: number): number => timeS * 1e9;
export const pfToF = (capacitancePf: number): number => capacitancePf * 1e-12;
export const fToPf = (capacitanceF: number): number => capacitanceF * 1e12;
export const uaToA = (currentUa: number): number => currentUa * 1e-6;
export const degToRad = (angleDeg: number): number => (angleDeg * Math.PI) / 180;
export const radToDeg = (angleRad: number): number => (angleRad * 180) / Math.PI;

/** Decibels of an amplitude ratio: 20·log10(ratio). */
export const amplitudeToDb = (ratio: number): number => 20 * Math.log10(ratio);

/** Level of an rms value over a millionth of its unit: dBµV, dBµA, dBµV/m. Zero gives −Infinity. */
export const rmsToMicroDb = (rms: number): number => 20 * Math.log10(rms / 1e-6);
/** Level of a field given as rms value: 20·log10(E / 1 µV/m), dBµV/m. Zero gives −Infinity. */
export const rmsFieldToDbuvPerM = (fieldRmsVPerM: number): number => rmsToMicroDb(fieldRmsVPerM);
/** Level of a field phasor's peak magnitude: the receiver reads rms, so 3.01 dB less. dBµV/m. */
export const peakFieldToDbuvPerM = (fieldPeakVPerM: number): number => rmsFieldToDbuvPerM(fieldPeakVPerM / Math.SQRT2);
