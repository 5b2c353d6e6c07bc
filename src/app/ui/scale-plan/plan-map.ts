import type MapBrowserEvent from 'ol/MapBrowserEvent';
import OlMap from 'ol/Map';
import View from 'ol/View';
import DragPan from 'ol/interaction/DragPan';
import MouseWheelZoom from 'ol/interaction/MouseWheelZoom';
import PinchZoom from 'ol/interaction/PinchZoom';
import PointerInteraction from 'ol/interaction/Pointer';
import Layer from 'ol/layer/Layer';
import Projection from 'ol/proj/Projection';
import { easeOut } from 'ol/easing';
import { MarksLayer } from './marks-layer';
import type { PlanMark, PlanPoint } from './plan-content';
import type { Sheet } from './drawing/sheet';

/** What the person does on the plan. */
export interface PlanActs {
  readonly viewChanged: (resolution: number) => void;
  readonly hovered: (at: PlanPoint | null) => void;
  readonly chose: (mark: PlanMark) => void;
  readonly pointed: (at: PlanPoint) => void;
  readonly mayMove: () => boolean;
  readonly moved: (mark: PlanMark, at: PlanPoint, settled: boolean) => void;
}

export type Draw = (sheet: Sheet, inSight: () => PlanMark[]) => void;

/** Pixels within which a mark is meant. */
const reach = 12;
const animation = 160;

/** A flat scene in metres: no globe, no tiles, nothing fetched. */
const scene = new Projection({ code: 'scene', units: 'm', global: false });

/**
 * The plan's view, layers and pointer. The grid and whatever moves are drawn anew in each frame;
 * marks and traces are a picture of their own (MarksLayer).
 */
export class PlanMap {
  readonly marks = new MarksLayer();
  private readonly view = new View({
    projection: scene,
    center: [0, 0],
    resolution: 0.05,
    minResolution: 1e-5,
    maxResolution: 50,
    enableRotation: false,
  });
  private readonly map: OlMap;
  private settledExtent: readonly number[] | null = null;

  constructor(
    private readonly element: HTMLElement,
    private readonly acts: PlanActs,
    under: Draw,
    over: Draw,
  ) {
    this.map = new OlMap({
      target: element,
      view: this.view,
      controls: [],
      interactions: [
        new DragPan(),
        new MouseWheelZoom({ duration: animation }),
        new PinchZoom(),
        this.dragMarks(),
      ],
      layers: [this.drawn(under), this.marks.layer, this.drawn(over)],
    });
    this.map.on('click', (event) => this.click(event));
    this.map.on('pointermove', (event) => {
      const [x, y] = event.coordinate;
      acts.hovered([x, y]);
      const near = this.marks.markNear([x, y], reach * this.resolution);
      element.style.cursor = near ? 'pointer' : '';
    });
    this.view.on('change:resolution', () => acts.viewChanged(this.resolution));
    // What was to be shown before the plan had a size is shown when it has one.
    this.map.on('change:size', () => {
      if (this.settledExtent) this.fit(this.settledExtent, false);
    });
  }

  get resolution(): number {
    return this.view.getResolution() ?? 1;
  }

  dispose(): void {
    this.map.setTarget(undefined);
    this.map.dispose();
  }

  redraw(): void {
    this.map.render();
  }

  /** At once: for print, where the next frame comes too late. */
  redrawNow(): void {
    this.map.renderSync();
  }

  /** Shows [left, bottom, right, top] whole. */
  fit([left, bottom, right, top]: readonly number[], animated: boolean): void {
    this.settledExtent = [left, bottom, right, top];
    const least = 0.05 * Math.max(right - left, top - bottom, 1);
    this.view.fit([left - least, bottom - least, right + least, top + least], {
      padding: [28, 28, 64, 28],
      duration: animated ? animation : 0,
    });
    if ((this.map.getSize()?.[0] ?? 0) > 0) this.settledExtent = null;
  }

  /** Zooms about a point, or about the middle. */
  zoom(factor: number, about: PlanPoint | null): void {
    this.view.animate({
      resolution: this.resolution / factor,
      anchor: about === null ? undefined : [about[0], about[1]],
      duration: animation,
      easing: easeOut,
    });
  }

  /** Moves the view by parts of its size. */
  pan(right: number, up: number): void {
    const [x, y] = this.centre();
    const [width, height] = this.map.getSize() ?? [0, 0];
    const { resolution } = this;
    this.view.animate({
      center: [x + right * width * resolution, y + up * height * resolution],
      duration: animation,
      easing: easeOut,
    });
  }

  /** Brings a point into sight if it is out of it. */
  reveal([x, y]: PlanPoint): void {
    if ((this.map.getSize()?.[0] ?? 0) === 0) return;
    const [left, bottom, right, top] = this.view.calculateExtent(this.map.getSize());
    const margin = 20 * this.resolution;
    const seen = x > left + margin && x < right - margin && y > bottom + margin && y < top - margin;
    if (!seen) this.view.animate({ center: [x, y], duration: animation });
  }

  private centre(): [number, number] {
    const [x = 0, y = 0] = this.view.getCenter() ?? [];
    return [x, y];
  }

  private click(event: MapBrowserEvent): void {
    const [x, y] = event.coordinate;
    const mark = this.marks.markNear([x, y], reach * this.resolution);
    if (mark) this.acts.chose(mark);
    else this.acts.pointed([x, y]);
  }

  private dragMarks(): PointerInteraction {
    let dragged: PlanMark | null = null;
    const at = (event: MapBrowserEvent): PlanPoint => [event.coordinate[0], event.coordinate[1]];
    return new PointerInteraction({
      handleDownEvent: (event) => {
        dragged = this.acts.mayMove()
          ? this.marks.markNear(event.coordinate, reach * this.resolution)
          : null;
        return dragged !== null;
      },
      handleDragEvent: (event) => {
        if (dragged) this.acts.moved(dragged, at(event), false);
      },
      handleUpEvent: (event) => {
        if (dragged) this.acts.moved(dragged, at(event), true);
        return false;
      },
    });
  }

  /** A layer that is drawn by hand in every frame. */
  private drawn(draw: Draw): Layer {
    const canvas = document.createElement('canvas');
    canvas.className = 'drawn';
    canvas.style.position = 'absolute';
    const context = canvas.getContext('2d');
    return new Layer({
      render: ({ size, pixelRatio, viewState, extent }) => {
        const [width, height] = size;
        canvas.width = Math.round(width * pixelRatio);
        canvas.height = Math.round(height * pixelRatio);
        canvas.style.width = `${width}px`;
        canvas.style.height = `${height}px`;
        const [x, y] = viewState.center;
        if (context) {
          context.setTransform(pixelRatio, 0, 0, pixelRatio, 0, 0);
          draw({ context, width, height, centre: [x, y], resolution: viewState.resolution }, () =>
            extent ? this.marks.marksWithin(extent) : [],
          );
        }
        return canvas;
      },
    });
  }
}
