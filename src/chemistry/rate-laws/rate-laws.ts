import { dysonSimon1968 } from './dyson-simon-1968.ts';
import { eklund1956 } from './eklund-1956.ts';
import { graaf1988 } from './graaf-1988.ts';
import { murase1970 } from './murase-1970.ts';
import type { RateLaw } from './rate-law.ts';
import { vandenBusscheFroment1996 } from './vanden-bussche-froment-1996.ts';
import { xuFroment1989 } from './xu-froment-1989.ts';

/** Every rate law by the name it has in a file. A new law needs its file, its test and one line here. */
export const rateLaws: ReadonlyMap<string, RateLaw> = new Map(
  [dysonSimon1968, murase1970, vandenBusscheFroment1996, graaf1988, xuFroment1989, eklund1956].map((law) => [
    law.name,
    law,
  ]),
);
