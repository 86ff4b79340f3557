// Sources that more than one table cites.

export const BUECKER_WAGNER_2006 =
  'reference equation of state of Buecker & Wagner 2006, CoolProp fluid file';
export const DE_REUCK_CRAVEN_1993 =
  'reference equation of state of de Reuck & Craven 1993, CoolProp fluid file';
export const GAO_2016 = 'reference equation of state of Gao et al. 2016, CoolProp fluid file';
export const GAO_2020 = 'reference equation of state of Gao et al. 2020, CoolProp fluid file';
export const LEACHMAN_2009 = 'reference equation of state of Leachman et al. 2009, CoolProp fluid file';
export const LEMMON_2009 = 'reference equation of state of Lemmon et al. 2009, CoolProp fluid file';
export const LEMMON_SPAN_2006 = 'reference equation of state of Lemmon & Span 2006, CoolProp fluid file';
export const ORTIZVEGA_2019 = 'reference equation of state of Ortiz-Vega et al. 2019, CoolProp fluid file';
export const SCHMIDT_WAGNER_1985 =
  'reference equation of state of Schmidt & Wagner 1985, CoolProp fluid file';
export const SCHROEDER_2014 = 'reference equation of state of Schroeder et al. 2014, CoolProp fluid file';
export const SETZMANN_WAGNER_1991 =
  'reference equation of state of Setzmann & Wagner 1991, CoolProp fluid file';
export const SMUKALA_2000 = 'reference equation of state of Smukala et al. 2000, CoolProp fluid file';
export const SPAN_2000 = 'reference equation of state of Span et al. 2000, CoolProp fluid file';
export const SPAN_WAGNER_1996 = 'reference equation of state of Span & Wagner 1996, CoolProp fluid file';
export const TEGELER_1999 = 'reference equation of state of Tegeler et al. 1999, CoolProp fluid file';
export const WAGNER_PRUSS_2002 =
  'reference equation of state of IAPWS-95 (Wagner & Pruss 2002), CoolProp fluid file';
export const WU_2011 = 'reference equation of state of Wu et al. 2011, CoolProp fluid file';

export const VDI_2010 = 'VDI Heat Atlas 2010, PPDS equations (as tabulated in the chemicals data library)';
export const PERRY_2_8 = 'Perry 8th ed. Table 2-8 (as tabulated in the chemicals data library)';
export const LANDOLT_BOERNSTEIN = 'Landolt-Boernstein IV/20 (as tabulated in the chemicals data library)';
