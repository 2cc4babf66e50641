/** Standard acceleration of gravity [m/s2], exact by convention (3rd CGPM, 1901). */
export const STANDARD_GRAVITY = 9.80665

/** Standard atmosphere [Pa], exact by convention (10th CGPM, 1954). */
export const STANDARD_ATMOSPHERE = 101325

/** Zero of the Celsius scale [K], exact by definition. */
export const ZERO_CELSIUS = 273.15

/** Euler's constant gamma_E (Abramowitz & Stegun 1964, table 1.1). */
export const EULER_GAMMA = 0.5772156649015329
