/** Speed of light in vacuum, m/s (exact, SI 2019). */
export const SPEED_OF_LIGHT_M_PER_S = 299_792_458;

/** Magnetic constant, H/m (CODATA 2018: 1.256 637 062 12e-6). */
export const MU0_H_PER_M = 1.256_637_062_12e-6;

/** Electric constant, F/m: 1/(µ0 c²). */
export const EPSILON0_F_PER_M = 1 / (MU0_H_PER_M * SPEED_OF_LIGHT_M_PER_S ** 2);

/** Wave impedance of free space, Ω: µ0 c. */
export const ETA0_OHM = MU0_H_PER_M * SPEED_OF_LIGHT_M_PER_S;
