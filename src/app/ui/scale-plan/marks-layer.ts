import Feature from 'ol/Feature';
import LineString from 'ol/geom/LineString';
import Point from 'ol/geom/Point';
import Polygon from 'ol/geom/Polygon';
import VectorImageLayer from 'ol/layer/VectorImage';
import VectorSource from 'ol/source/Vector';
import CircleStyle from 'ol/style/Circle';
import Fill from 'ol/style/Fill';
import Icon from 'ol/style/Icon';
import Stroke from 'ol/style/Stroke';
import Style, { type StyleFunction } from 'ol/style/Style';
import { markKinds, type MarkKind } from '#shared/contracts/survey';
import { symbolDensity, symbolImage } from './drawing/symbol-images';
import { ellipse95, ellipseRing } from './error-ellipse';
import type { PlanColours } from './plan-colours';
import type { PlanMark, PlanPoint, PlanTrace } from './plan-content';

/** An ellipse smaller than this on the screen is hidden under its symbol. */
const leastEllipse = 6;

/** Symbols of a trace that would stand closer than this hide it; they become dots on the line. */
const closestSymbols = 12;

const markKey = 'mark';

/**
 * Marks, their ellipses and traces: drawn into one picture that is moved while the plan is panned
 * and zoomed and renewed afterwards, so ten thousand marks stay smooth.
 */
export class MarksLayer {
  private readonly source = new VectorSource();
  readonly layer = new VectorImageLayer({ source: this.source, imageRatio: 1.5 });

  show(
    marks: readonly PlanMark[],
    traces: readonly PlanTrace[],
    ellipseScale: number,
    colours: PlanColours,
  ): void {
    const styles = stylesIn(colours);
    const features: Feature[] = traces.map((trace) => {
      const feature = new Feature(new LineString(trace.path.map(pair)));
      feature.setStyle(trace.ground ? styles.ground : styles.trace);
      return feature;
    });
    const spacings = new Map(traces.map((trace) => [trace.label, spacingOf(trace)]));
    for (const mark of marks) {
      if (mark.covariance !== null && ellipseScale > 0) {
        const ellipse = ellipse95(mark.covariance);
        const feature = new Feature(new Polygon([ellipseRing(mark.at, ellipse, ellipseScale)]));
        feature.setStyle(shownFrom(2 * ellipse.major * ellipseScale, styles.ellipse));
        features.push(feature);
      }
      const feature = new Feature(new Point(pair(mark.at)));
      feature.set(markKey, mark, true);
      const spacing = mark.trace === null ? undefined : spacings.get(mark.trace);
      const symbol = styles.symbols[mark.kind];
      feature.setStyle(
        spacing === undefined
          ? symbol
          : (_feature, resolution) =>
              spacing / resolution >= closestSymbols ? symbol : styles.dot,
      );
      features.push(feature);
    }
    this.source.clear(true);
    this.source.addFeatures(features);
  }

  /** The mark nearest to a scene point, if one is within `reach` metres. */
  markNear(at: readonly number[], reach: number): PlanMark | null {
    const feature = this.source.getClosestFeatureToCoordinate(pairOf(at), isMark);
    const mark = feature ? markOf(feature) : null;
    return mark && Math.hypot(mark.at[0] - at[0], mark.at[1] - at[1]) <= reach ? mark : null;
  }

  marksWithin(extent: number[]): PlanMark[] {
    return this.source.getFeaturesInExtent(extent).flatMap((feature) => markOf(feature) ?? []);
  }
}

const pair = ([x, y]: PlanPoint): [number, number] => [x, y];
const pairOf = ([x, y]: readonly number[]): [number, number] => [x, y];
const isMark = (feature: Feature): boolean => feature.get(markKey) !== undefined;
const markOf = (feature: Feature): PlanMark | null =>
  (feature.get(markKey) as PlanMark | undefined) ?? null;

/** Mean distance between the points of a trace, m. */
function spacingOf({ path }: PlanTrace): number {
  if (path.length < 2) return Infinity;
  let length = 0;
  for (let i = 1; i < path.length; i++) {
    length += Math.hypot(path[i][0] - path[i - 1][0], path[i][1] - path[i - 1][1]);
  }
  return length / (path.length - 1);
}

const shownFrom =
  (size: number, style: Style): StyleFunction =>
  (_feature, resolution) =>
    size / resolution >= leastEllipse ? style : undefined;

function stylesIn(colours: PlanColours) {
  const symbols = Object.fromEntries(
    markKinds.map((kind) => [
      kind,
      new Style({
        image: new Icon({ img: symbolImage(kind, colours), scale: 1 / symbolDensity }),
        zIndex: 3,
      }),
    ]),
  ) as Record<MarkKind, Style>;
  return {
    symbols,
    dot: new Style({
      image: new CircleStyle({ radius: 1.6, fill: new Fill({ color: colours.chalk }) }),
      zIndex: 2,
    }),
    trace: new Style({ stroke: new Stroke({ color: faint(colours.chalk), width: 2 }), zIndex: 1 }),
    ground: new Style({ stroke: new Stroke({ color: faint(colours.muted), width: 2 }), zIndex: 0 }),
    ellipse: new Style({ stroke: new Stroke({ color: colours.chalk, width: 1 }), zIndex: 2 }),
  };
}

/** The colour at 55 % of its strength; computed colours come as `rgb(r, g, b)`. */
function faint(colour: string): string {
  const parts = /^rgb\((.+)\)$/.exec(colour)?.[1].split(/[\s,]+/);
  return parts ? `rgba(${parts.slice(0, 3).join(', ')}, 0.55)` : colour;
}
