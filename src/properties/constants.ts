/** Molar gas constant [J/(mol K)], exact since 2019. @source CODATA 2018 */
export const R = 8.31446261815324;
/** Gas constant the NASA nine-coefficient fits were made with [J/(mol K)]. @source McBride, Zehe & Gordon, NASA/TP-2002-211556 */
export const R_NASA = 8.31451;
/** Standard pressure of the thermochemical tables [Pa]. @source IUPAC 1982 */
export const STANDARD_PRESSURE_PA = 1e5;
/** Volume of one mole of ideal gas at 0 degC and 1.01325 bar [m3/mol]. @source CODATA 2018; DIN 1343 normal state */
export const NORMAL_VOLUME_M3_PER_MOL = 0.022413969545014137;
