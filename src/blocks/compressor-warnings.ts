/**
 * Discharge temperature from which a centrifugal machine is out of the ordinary [K]: 450 degF. Reciprocating
 * machines stop at 150 to 177 degC. @source common practice (after API 617 and 618)
 */
const DISCHARGE_LIMIT_K = 232 + 273.15;

/** The first cooler that has nothing to cool: behind which stage, and what that discharges at. */
export interface IdleCooler {
  readonly behind: number;
  readonly dischargeK: number;
}

/** A word of warning of a compressor. */
interface Warning {
  readonly code: string;
  readonly message: string;
}

export function liquidAtSuction(what: string): Warning {
  return { code: 'liquid-at-suction', message: `liquid ${what}` };
}

export function idleIntercooling(idle: IdleCooler, wantedK: number): Warning {
  return {
    code: 'idle-intercooling',
    message: `intercooling to ${celsius(wantedK)} is hotter than the ${celsius(idle.dischargeK)} at which stage ${idle.behind} discharges, so the cooler behind it does nothing; set intercooling lower`,
  };
}

export function hotDischarge(hottestK: number, limitK: number | undefined): Warning[] {
  if (hottestK <= (limitK ?? DISCHARGE_LIMIT_K)) return [];
  const limit =
    limitK === undefined
      ? `the usual limit of ${celsius(DISCHARGE_LIMIT_K)}`
      : `its discharge_limit of ${celsius(limitK)}`;
  return [
    {
      code: 'hot-discharge',
      message: `the discharge reaches ${celsius(hottestK)}, above ${limit}; use more stages with intercooling`,
    },
  ];
}

function celsius(T: number): string {
  return `${(T - 273.15).toFixed(0)} degC`;
}
