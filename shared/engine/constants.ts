/** Magnetic constant, H/m. Source: SI before 2019; CODATA 2018 differs by 1 in 10⁹. */
export const MU_0_H_PER_M = 4e-7 * Math.PI

/** Resistivity of standard annealed copper at 20 °C. Source: IEC 60028:1925. */
export const COPPER_RESISTIVITY_20C_OHM_MM2_PER_M = 1 / 58

/** Resistance temperature coefficient of copper at 20 °C, constant mass. Source: IEC 60028:1925. */
export const COPPER_ALPHA_20C_PER_K = 0.00393

/** Density of copper, kg/m³. Source: IEC 60028:1925. */
export const COPPER_DENSITY_KG_PER_M3 = 8890

/** Inferred temperature of zero resistance of copper, °C, with its sign turned. Source: IEC 60034-1. */
export const COPPER_ZERO_RESISTANCE_OFFSET_C = 234.5

/** Resistivity of aluminium conductors at 20 °C. Source: IEC 60889, rounded handbook value. */
export const ALUMINIUM_RESISTIVITY_20C_OHM_MM2_PER_M = 0.0282

/** Resistance temperature coefficient of aluminium at 20 °C. Source: IEC 60889. */
export const ALUMINIUM_ALPHA_20C_PER_K = 0.00403

/** Conductivities that IEC 60317-0-1 takes for the nominal, least and greatest resistance of enamelled copper wire, m/(Ω·mm²). */
export const ENAMELLED_WIRE_CONDUCTIVITY = { nominal: 58.5, highest: 59, lowest: 58 } as const

/** Temperature at which all tabulated wire resistances hold, °C. Source: IEC 60317-0-1. */
export const REFERENCE_TEMPERATURE_C = 20
