import type { Flowsheet } from '../../model/flowsheet.ts';
import type { Result } from '../../model/result.ts';
import { tradeOff, tradeOffFormulas } from '../../study/trade-off.ts';
import { pointText } from '../charts/number-text.ts';
import { chartStyle } from '../charts/palette.ts';
import { type DrawingOptions, drawingOf } from '../drawing/drawing.ts';
import { closingLine } from '../text.ts';
import { calculationStyle } from './calculation-style.ts';
import { figure, type PageSection, pageDocument } from './document.ts';
import { html, userText } from './html.ts';
import { jobFields } from './job.ts';
import { handlesOf, type LiveData, standing } from './live-data.ts';
import { panel } from './panel.ts';
import { drawingPart, partsAfter, partsBefore } from './parts.ts';
import { asInFiles } from './tables.ts';
import type { PagePart, PageView } from './view.ts';

/** What brings a page to life: the script, and the file that it reads again with settings moved. */
export interface LivePage {
  /** JavaScript of dist/live.js */
  readonly script: string;
  /** the flowsheet file */
  readonly text: string;
  /** changes of the command line, made in the page too */
  readonly set: readonly string[];
}

export interface PageOptions {
  readonly flowsheet: Flowsheet;
  readonly version?: string;
  readonly drawing?: DrawingOptions;
  /** left out: a page that stands still */
  readonly live?: LivePage;
}

/** The calculation sheet of a closed loop as one HTML file. */
export async function sheetPage(result: Result, options: PageOptions): Promise<string> {
  const { flowsheet, live } = options;
  const handles = handlesOf(flowsheet);
  const formulas = tradeOffFormulas(result.figures);
  const view: PageView = {
    result,
    flowsheet,
    asInFile: flowsheet,
    at: standing(flowsheet, handles),
    tradeOffs: handles.map((handle) => tradeOff(flowsheet, handle, formulas)),
    words: asInFiles,
    axisText: pointText,
  };
  const { svg } = await drawingOf(result, { ...options.drawing, forPage: true });
  const diagram: PageSection = {
    ...drawingPart,
    html: figure(
      svg,
      'Flow diagram of the loop; the stream table says the same in numbers',
      'At every stream its tag, temperature, pressure (absolute) and flow. Heavy line: goes round in a recycle; double head: on the way back; light line: passes once.',
    ),
    mark: 'diagram',
  };
  const data: LiveData | undefined = live && {
    // Without its folder: a page is handed on, and whose disk it came from is nobody's business.
    file: flowsheet.file.split(/[/\\]/).at(-1) ?? flowsheet.file,
    text: live.text,
    case: flowsheet.caseName,
    set: live.set,
  };
  return pageDocument({
    title: result.title || 'Untitled flowsheet',
    document: 'Calculation sheet',
    job: jobFields(view, options.drawing?.titleBlock ?? {}, options.version ?? ''),
    lead: result.convergence.converged
      ? html`<div id="lead"></div>`
      : html`<div id="lead"><p class="alarm"><strong>NOT CLOSED.</strong> ${userText(closingLine(result))}</p></div>`,
    ...(live === undefined
      ? {}
      : { panel: panel(view, handles, flowsheet.handles.length > 0), data, script: live.script }),
    sections: [...sectionsOf(partsBefore, view), diagram, ...sectionsOf(partsAfter, view)],
    style: chartStyle + calculationStyle,
  });
}

function sectionsOf(parts: readonly PagePart[], view: PageView): PageSection[] {
  return parts.flatMap(({ id, heading, newSheet, render }): PageSection[] => {
    const body = render(view);
    return body === null ? [] : [{ id, heading, html: body, ...(newSheet ? { newSheet } : {}) }];
  });
}
