/** Speed of light in vacuum [m/s], exact by the SI definition of the metre. */
export const SPEED_OF_LIGHT_M_PER_S = 299_792_458;

/** Boltzmann constant [J/K], exact by the SI of 2019. */
export const BOLTZMANN_J_PER_K = 1.380649e-23;

/** Reference temperature of the noise figure [K] (IEEE definition). */
export const REFERENCE_TEMPERATURE_K = 290;

/** 0 degC in kelvin. */
export const ZERO_CELSIUS_K = 273.15;

/** Standard acceleration of free fall [m/s^2], conventional value. */
export const STANDARD_GRAVITY_M_PER_S2 = 9.80665;

/** Mean radius of the Earth in the propagation Recommendations [km], such as ITU-R P.452-18, equation 6a. */
export const EARTH_RADIUS_KM = 6371;

export const RADIANS_PER_DEGREE = Math.PI / 180;

/** Wavelength in air taken as vacuum [m] for a frequency [GHz]. */
export function wavelengthM(frequencyGHz: number): number {
  return SPEED_OF_LIGHT_M_PER_S / (frequencyGHz * 1e9);
}
