import { z } from 'zod';

/** The name of an outlet that the user chooses; `rest` is what is left. */
export const portName = z
  .string()
  .regex(/^[A-Za-z][A-Za-z0-9_]*$/)
  .refine((name) => name !== 'rest', { params: { code: 'reserved-name' } });
