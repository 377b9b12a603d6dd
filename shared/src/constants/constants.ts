/** Physical constants, SI units, CODATA 2022 (P. J. Mohr et al., NIST listing); R, kB, h, NA and e are exact in the SI. */
export const PLANCK = 6.62607015e-34;
export const REDUCED_PLANCK = PLANCK / (2 * Math.PI);
export const VACUUM_PERMEABILITY = 1.25663706127e-6;
export const BOLTZMANN = 1.380649e-23;
export const AVOGADRO = 6.02214076e23;
export const GAS_CONSTANT = 8.31446261815324;
/** Shielded proton (water sphere, 25 C) over 2 pi, MHz/T: turns `protonMHz` into B0 in tesla. */
export const SHIELDED_PROTON_MHZ_PER_TESLA = 42.57638543;
/** Bare proton magnetogyric ratio, rad s^-1 T^-1. */
export const PROTON_GAMMA = 2.6752218708e8;
