import type { Figures } from '../model/result.ts';

/** Does nothing take or deliver power here, no machine and no refrigeration? A sheet then says none: a nought reads as a result. */
export function isWithoutPower({ power_kW }: Figures): boolean {
  return Object.values(power_kW).every((power) => power === 0);
}

/** Is this figure, by its dotted name, one that there is not without power? */
export function isOfPower(figure: string): boolean {
  return figure.startsWith('power_kW.') || figure === 'specific_power_kWh_t';
}
