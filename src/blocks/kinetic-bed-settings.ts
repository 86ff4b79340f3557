import { z } from 'zod';
import { rateLaws } from '../chemistry/rate-laws/rate-laws.ts';
import { fraction, quantity } from '../units/schema.ts';

const lawNames = [...rateLaws.keys()] as [string, ...string[]];

/** What a file says of a kinetic bed; SI. */
export const kineticBedSettings = z.strictObject({
  rate_law: z.enum(lawNames).meta({ description: 'the published rate law' }),
  reactions: z
    .array(z.string())
    .min(1)
    .meta({ description: 'names of the reactions of the flowsheet that the rate law runs' }),
  volume: quantity('volume', { description: 'volume of the bed' }).optional(),
  catalyst_mass: quantity('mass', { description: 'mass of the catalyst' }).optional(),
  bulk_density: quantity('density', { description: 'mass of catalyst per volume of bed' }).optional(),
  activity: fraction({
    max: 10,
    description: 'factor on the rate, e.g. 60 % for an aged catalyst; 100 % if left out',
  }).optional(),
  effectiveness: z
    .union([
      z.literal('published'),
      fraction({ description: 'share of the rate that whole pellets keep; 1 if left out' }),
    ])
    .optional(),
  conversion_before: fraction({
    description: 'conversion in beds before this one, which a published effectiveness counts',
  }).optional(),
  equilibrium: z
    .enum(['flowsheet', 'authors'])
    .meta({ description: 'whose constants and activities say where the reactions stop' })
    .optional(),
  adiabatic: z.literal(true).optional(),
  temperature: quantity('temperature', {
    description: 'the whole bed at this temperature; the duty follows',
  }).optional(),
  cooling: z
    .strictObject({
      temperature: quantity('temperature', { description: 'of the coolant, e.g. boiling water' }),
      heat_transfer: quantity('heatTransferPerVolume', {
        description: 'per volume of bed; for tubes 4 U/d',
      }),
    })
    .optional(),
  pressure_drop: quantity('pressureDifference', {
    min: 0,
    description: 'pressure lost, evenly along the bed',
  }).optional(),
});
export type KineticBedSettings = z.infer<typeof kineticBedSettings>;

/** Volume of the bed [m3]; null where it is not known. */
export function bedVolume({
  volume,
  catalyst_mass: mass,
  bulk_density: density,
}: KineticBedSettings): number | null {
  if (volume !== undefined) return volume;
  return mass !== undefined && density !== undefined ? mass / density : null;
}

/** Mass of its catalyst [kg]; null where it is not known. */
export function bedMass({
  volume,
  catalyst_mass: mass,
  bulk_density: density,
}: KineticBedSettings): number | null {
  if (mass !== undefined) return mass;
  return volume !== undefined && density !== undefined ? volume * density : null;
}
