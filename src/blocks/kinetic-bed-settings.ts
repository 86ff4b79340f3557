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
    .meta({
      description: 'names of the reactions of the flowsheet that the rate law runs',
      examples: [['synthesis']],
    }),
  volume: quantity('volume', { description: 'volume of the bed; this or catalyst_mass' }).optional(),
  catalyst_mass: quantity('mass', { description: 'mass of the catalyst; this or volume' }).optional(),
  bulk_density: quantity('density', { description: 'mass of catalyst per volume of bed' }).optional(),
  activity: fraction({
    max: 10,
    description: 'factor on the rate, e.g. 60 % for an aged catalyst; 100 % if left out',
    examples: ['60 %'],
  }).optional(),
  effectiveness: z
    .union([
      z.literal('published'),
      fraction({ description: 'share of the rate that whole pellets keep; 1 if left out' }),
    ])
    .meta({
      description:
        "share of the rate that whole pellets keep, or published for the authors' own; 1 if left out [%]",
      examples: ['70 %', 'published'],
    })
    .optional(),
  conversion_before: fraction({
    description:
      'conversion in beds before this one, which a published effectiveness counts; none if left out',
    examples: ['10 %'],
  }).optional(),
  equilibrium: z
    .enum(['flowsheet', 'authors'])
    .meta({
      description: 'whose constants and activities say where the reactions stop; flowsheet if left out',
    })
    .optional(),
  adiabatic: z
    .literal(true)
    .meta({ description: 'no heat is exchanged; one of adiabatic, temperature and cooling' })
    .optional(),
  temperature: quantity('temperature', {
    description: 'the whole bed at this temperature; the duty follows',
  }).optional(),
  cooling: z
    .strictObject({
      temperature: quantity('temperature', {
        description: 'of the coolant, e.g. boiling water',
        examples: ['255 degC'],
      }),
      heat_transfer: quantity('heatTransferPerVolume', {
        description: 'per volume of bed; for tubes 4 U/d',
      }),
    })
    .meta({
      description: 'a coolant along the bed; one of adiabatic, temperature and cooling',
      examples: [{ temperature: '255 degC', heat_transfer: '50 kW/(m3 K)' }],
    })
    .optional(),
  pressure_drop: quantity('pressureDifference', {
    min: 0,
    description: 'pressure lost, evenly along the bed; none if left out',
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
