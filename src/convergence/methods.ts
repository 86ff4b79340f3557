import type { MethodName } from '../model/flowsheet.ts';
import { createAnderson } from './anderson.ts';
import { createAuto } from './auto.ts';
import { createBroyden } from './broyden.ts';
import { createDirect } from './direct.ts';
import { createEigenvalue } from './eigenvalue.ts';
import type { FixedPointMethod } from './method.ts';
import { createNewton } from './newton.ts';
import { createWegstein } from './wegstein.ts';

/** Every method by its name in the file and on the command line. */
export const methods: Readonly<Record<MethodName, () => FixedPointMethod>> = {
  auto: createAuto,
  direct: createDirect,
  wegstein: createWegstein,
  eigenvalue: createEigenvalue,
  anderson: createAnderson,
  broyden: createBroyden,
  newton: createNewton,
};
