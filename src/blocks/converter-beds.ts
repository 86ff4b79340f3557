import { copyStream, emptyStream, type StreamState } from '../model/stream.ts';
import { solveState } from '../properties/solve-state.ts';
import { type BedSettings, shotPort } from './bed-settings.ts';
import { createBedSlopes } from './bed-slopes.ts';
import type { BlockContext, BlockReport, Unit } from './block.ts';
import { createCarbonReport } from './carbon-report.ts';
import { pressureAfterDrop } from './checks.ts';
import { bedLine, conversionOf, equilibriumLine, keyReactant } from './operating-line.ts';
import { createReactionRun, type ReactionRun, type ReactionSetting } from './reaction-run.ts';
import { liquidWarnings } from './reactor-warnings.ts';
import { enthalpyAdded, quietReport } from './report.ts';

/** What a reactor with beds reads from its settings at each pass. */
export interface BedsSetting {
  readonly reactions: Readonly<Record<string, ReactionSetting>>;
  readonly beds: readonly BedSettings[];
  /** shared equally by the beds where they have none of their own [Pa] */
  readonly pressure_drop?: number | undefined;
}

interface Bed {
  readonly setting: BedSettings;
  readonly run: ReactionRun;
  /** index of the reactor's inlet that quenches before it; 0 for none */
  readonly shot: number;
  readonly into: StreamState;
  readonly out: StreamState;
  /** all that was fed up to here [mol/s] */
  readonly fed: Float64Array;
  /** heat added before the bed [W] */
  dutyW: number;
}

/**
 * Adiabatic equilibrium beds in series. Before each bed the gas is brought to a set temperature, given a set
 * heat, or mixed with cold gas from a port of its own; in the bed all equilibria run at once to the temperature
 * that the enthalpy of the bed's inlet gives:
 *   H_out = H_in,  n_out = n_in + Σ ν ξ(T_out, P_out)
 * Pressures: a quench takes the lower one of its two gases; each bed loses its pressure drop.
 */
export function createConverterBeds(setting: BedsSetting, context: BlockContext): Unit {
  const { mixture } = context;
  const beds = createBeds(setting, context);
  const last = beds.at(-1)!;
  const carbon = createCarbonReport(mixture);
  const atEquilibrium = createReactionRun(setting.reactions, context, { approach: 0 });
  const running = Object.keys(setting.reactions).map(
    (name) => context.reactions.find((r) => r.name === name)!,
  );
  const keys = [...new Set(running.map((one) => keyReactant(one, mixture)))];
  const slopes = createBedSlopes(mixture, beds);
  let started = false;

  /** Bring what leaves `before` to the inlet of a bed. */
  function prepare(bed: Bed, before: StreamState, shot: StreamState | null): void {
    const { into } = bed;
    const guessK = into.temperatureK;
    copyStream(before, into);
    if (shot !== null) {
      for (let i = 0; i < mixture.size; i++) into.flowsMolPerS[i] += shot.flowsMolPerS[i];
      if (mixture.total(before) === 0) into.pressurePa = shot.pressurePa;
      else if (mixture.total(shot) > 0) into.pressurePa = Math.min(before.pressurePa, shot.pressurePa);
      if (started) into.temperatureK = guessK;
      mixture.settleAtEnthalpy(into, before.enthalpyW + shot.enthalpyW);
    } else if (bed.setting.inlet_temperature !== undefined) {
      into.temperatureK = bed.setting.inlet_temperature;
      mixture.settle(into);
    } else if (bed.setting.duty !== undefined) {
      if (started) into.temperatureK = guessK;
      mixture.settleAtEnthalpy(into, before.enthalpyW + bed.setting.duty);
    }
    bed.dutyW = shot === null ? into.enthalpyW - before.enthalpyW : 0;
  }

  /** Run a bed to the temperature that its enthalpy gives. */
  function react({ setting: own, run, into, out }: Bed): void {
    const drop = own.pressure_drop ?? (setting.pressure_drop ?? 0) / beds.length;
    out.pressurePa = pressureAfterDrop(into.pressurePa, drop);
    out.flowsMolPerS.set(into.flowsMolPerS);
    if (!started) out.temperatureK = into.temperatureK;
    const reactAndSettle = (state: StreamState) => {
      run.react(state.temperatureK, state.pressurePa, into.flowsMolPerS, state.flowsMolPerS);
      mixture.settle(state);
    };
    solveState(out, into.enthalpyW, 'enthalpy', reactAndSettle, (state) => state.enthalpyW);
    // As in Mixture.settleAtEnthalpy: the balance closes exactly, and nothing holds no enthalpy.
    if (mixture.total(out) > 0) out.enthalpyW = into.enthalpyW;
  }

  return {
    pass(inlets, outlets) {
      let before = inlets[0];
      let fed: Float64Array | null = null;
      for (const bed of beds) {
        const shot = bed.shot > 0 ? inlets[bed.shot] : null;
        bed.fed.set(fed ?? inlets[0].flowsMolPerS);
        if (shot) for (let i = 0; i < mixture.size; i++) bed.fed[i] += shot.flowsMolPerS[i];
        prepare(bed, before, shot);
        react(bed);
        before = bed.out;
        fed = bed.fed;
      }
      started = true;
      copyStream(last.out, outlets[0]);
    },
    slopes: (inlets, _outlets, room) => slopes(inlets, room),
    report(inlets, outlets) {
      const exchanges = beds.some(({ setting: own }) => (own.inlet_temperature ?? own.duty) !== undefined);
      return quietReport({
        dutyW: exchanges ? enthalpyAdded(inlets, outlets) : 0,
        details: {
          inlet_K: inlets[0].temperatureK,
          outlet_K: outlets[0].temperatureK,
          outlet_bar: outlets[0].pressurePa / 1e5,
          extent_kmol_h: totalExtents(),
          ...carbon.details(inlets[0], outlets[0]),
          beds: Object.fromEntries(beds.map((bed, k) => [`bed${k + 1}`, bedDetails(bed, inlets)])),
        },
        warnings: warnings(inlets, outlets),
        assumptions: assumptions(),
        curves: lines,
      });
    },
  };

  function totalExtents(): Record<string, number> {
    const sum: Record<string, number> = {};
    for (const { run } of beds) {
      for (const [name, extent] of Object.entries(run.extents())) sum[name] = (sum[name] ?? 0) + extent * 3.6;
    }
    return sum;
  }

  function bedDetails(bed: Bed, inlets: readonly StreamState[]): BlockReport['details'] {
    const { into, out, run, fed, shot, dutyW } = bed;
    const { extent_kmol_h, approach_K, fraction_of_equilibrium } = run.report(out.temperatureK).details;
    return {
      inlet_K: into.temperatureK,
      outlet_K: out.temperatureK,
      outlet_bar: out.pressurePa / 1e5,
      duty_kW: dutyW / 1e3,
      shot_kmol_h: shot > 0 ? mixture.total(inlets[shot]) * 3.6 : 0,
      conversion: Object.fromEntries(
        keys.map((key) => [mixture.components[key].id, conversionOf(key, fed, out.flowsMolPerS)]),
      ),
      extent_kmol_h,
      approach_K,
      fraction_of_equilibrium,
    };
  }

  function lines(): BlockReport['details'] {
    const key = keys.find((one) => last.fed[one] > 0) ?? keys[0];
    const operating = beds.flatMap(({ into, out, fed }, k) => bedLine(k + 1, into, out, key, fed, mixture));
    const bar = last.out.pressurePa / 1e5;
    return {
      lines_of: mixture.components[key].id,
      operating_line: operating,
      equilibrium_line: equilibriumLine(atEquilibrium, operating, key, last.fed, last.out.pressurePa),
      equilibrium_line_bar: bar,
    };
  }

  function warnings(
    inlets: readonly StreamState[],
    outlets: readonly StreamState[],
  ): BlockReport['warnings'] {
    const places = beds.flatMap(({ into, out }, k) => [
      { name: `inlet of bed ${k + 1}`, stream: into },
      { name: `outlet of bed ${k + 1}`, stream: out },
    ]);
    const ofBeds = beds.flatMap(({ run, out }, k) =>
      run.report(out.temperatureK).warnings.map(({ code, message }) => ({
        code,
        message: `bed ${k + 1}: ${message}`,
      })),
    );
    return [
      ...carbon.warnings(places),
      ...ofBeds,
      ...liquidWarnings(places),
      ...beds.flatMap((bed, k) => (k > 0 ? heated(bed, beds[k - 1], k) : [])),
      ...beds.flatMap((bed, k) => (bed.shot > 0 ? letDown(bed, beds[k - 1], inlets, k) : [])),
      ...mixture.cautions(outlets[0]),
    ];
  }

  /** Between beds that warm the gas one expects it to be cooled. */
  function heated({ into }: Bed, { into: beforeIn, out: before }: Bed, k: number): BlockReport['warnings'] {
    const warms = before.temperatureK > beforeIn.temperatureK;
    if (!warms || !(into.temperatureK > before.temperatureK + 1e-6)) return [];
    const message = `the gas leaves bed ${k} at ${celsius(before)} degC and enters bed ${k + 1} at ${celsius(into)} degC: it is heated between two beds that warm it themselves`;
    return [{ code: 'bed-heated', message }];
  }

  function letDown(
    { shot }: Bed,
    { out: before }: Bed,
    inlets: readonly StreamState[],
    k: number,
  ): BlockReport['warnings'] {
    const cold = inlets[shot];
    if (mixture.total(cold) === 0 || cold.pressurePa >= before.pressurePa * (1 - PRESSURE_SLACK)) return [];
    const message = `${shotPort(k + 1)} arrives at ${(cold.pressurePa / 1e5).toFixed(2)} bar, below the ${(before.pressurePa / 1e5).toFixed(2)} bar of the gas it joins, which is let down to it`;
    return [{ code: 'mixing-pressure', message }];
  }

  function assumptions(): string[] {
    const quenched = beds.some((bed) => bed.shot > 0);
    const sharesDrop = setting.pressure_drop !== undefined && beds.length > 1;
    return [
      ...(sharesDrop ? ['The pressure drop is shared equally by the beds.'] : []),
      quenched
        ? 'Conversion along the beds refers to what was fed up to there; the equilibrium line is that of all gas fed, shots mixed in, at outlet pressure and without approach.'
        : 'The equilibrium line is that of the gas fed, at outlet pressure and without approach.',
    ];
  }
}

/** A pressure short of another by less than this share is taken for equal. */
const PRESSURE_SLACK = 1e-9;

function createBeds(setting: BedsSetting, context: BlockContext): Bed[] {
  const { size } = context.mixture;
  let shots = 0;
  return setting.beds.map((bed) => ({
    setting: bed,
    run: createReactionRun(setting.reactions, context, bed),
    shot: bed.quench ? ++shots : 0,
    into: emptyStream(size),
    out: emptyStream(size),
    fed: new Float64Array(size),
    dutyW: 0,
  }));
}

function celsius({ temperatureK }: StreamState): string {
  return (temperatureK - 273.15).toFixed(1);
}
