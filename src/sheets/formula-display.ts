import type { Flowsheet } from '../model/flowsheet.ts';
import { type FigureDisplay, figureDisplay, plainDisplay, settingDisplay } from './figure-display.ts';

/** How the value of a formula is shown: as its unit says where it is a single name, else as a bare number. */
export function formulaDisplay(text: string, flowsheet: Flowsheet): FigureDisplay {
  const formula = text.trim();
  if (formula === 'cost' || formula === 'profit')
    return plainDisplay(`${flowsheet.prices?.currency ?? ''}/h`);
  if (!/^[A-Za-z_][\w.]*$/.test(formula)) return plainDisplay('');
  const [root, , field] = formula.split('.');
  if (root === 'figures') {
    const units = Object.fromEntries(flowsheet.figures.map(({ name, unit }) => [name, unit]));
    return figureDisplay(formula.slice('figures.'.length), units);
  }
  if (root === 'blocks') return plainDisplay(field === 'duty' || field === 'power' ? 'kW' : '');
  if (field === 'T') return settingDisplay('temperature', 'K');
  if (field === 'y' || field === 'w' || field === 'vapour_fraction') return settingDisplay('fraction', '');
  return plainDisplay(STREAM_UNITS[field ?? ''] ?? '');
}

const STREAM_UNITS: Readonly<Record<string, string>> = {
  n: 'kmol/h',
  flow: 'kmol/h',
  m: 'kg/h',
  mass: 'kg/h',
  P: 'bar',
  enthalpy: 'kW',
};
