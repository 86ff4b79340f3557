/** A value of a chart that a reader may ask for. */
export interface ChartPoint {
  /** place in the drawing */
  readonly left: number;
  readonly top: number;
  /** name of the series, '' where there is one only */
  readonly name: string;
  readonly x: number;
  readonly y: number;
  /** the figure of a contour chart; null on a chart of lines, NaN where the case failed */
  readonly value: number | null;
}

/** The points of a chart in rows: one row for each series, or for each value of the upright setting. */
export type PointRows = readonly (readonly ChartPoint[])[];

/** Read the points out of the attributes that the charts carry. */
export function pointRows(svg: SVGSVGElement): PointRows {
  const atX = placing(svg.dataset['xAxis'] ?? '');
  const atY = placing(svg.dataset['yAxis'] ?? '');
  const series = [...svg.querySelectorAll<SVGGElement>('g.series')].map(({ dataset }) => {
    const y = numbers(dataset['y']);
    return numbers(dataset['x']).map((x, k): ChartPoint => {
      return { left: atX(x), top: atY(y[k]!), name: dataset['name'] ?? '', x, y: y[k]!, value: null };
    });
  });
  const nodes = svg.querySelector<SVGGElement>('g.nodes');
  if (nodes === null) return series.filter((row) => row.length > 0);
  const { columns, rows, values, name = '' } = nodes.dataset;
  const found = numbers(values);
  const across = numbers(columns);
  return numbers(rows).map((y, j) =>
    across.map((x, i): ChartPoint => {
      return { left: atX(x), top: atY(y), name, x, y, value: found[j * across.length + i]! };
    }),
  );
}

/** The point nearest to a place in the drawing: its row and its place in the row; null where there are none. */
export function nearestPoint(rows: PointRows, left: number, top: number): readonly [number, number] | null {
  let best: readonly [number, number] | null = null;
  let least = Number.POSITIVE_INFINITY;
  for (const [r, row] of rows.entries()) {
    for (const [k, point] of row.entries()) {
      const distance = (point.left - left) ** 2 + (point.top - top) ** 2;
      if (distance >= least) continue;
      least = distance;
      best = [r, k];
    }
  }
  return best;
}

/** From a value to a place, by the ends of an axis: `from to low high linear|log`. */
function placing(axis: string): (value: number) => number {
  const [from = 0, to = 0, low = 0, high = 1] = axis.split(' ').map(Number);
  const isLog = axis.endsWith('log');
  return (value) => {
    const share = isLog ? Math.log(value / low) / Math.log(high / low) : (value - low) / (high - low);
    return from + share * (to - from);
  };
}

/** Numbers with blanks between them; `-` stands where there is none. */
function numbers(text: string | undefined): number[] {
  if (text === undefined || text === '') return [];
  return text.split(' ').map((word) => (word === '-' ? Number.NaN : Number(word)));
}
