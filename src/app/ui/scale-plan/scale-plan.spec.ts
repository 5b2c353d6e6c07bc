import { TestBed, type ComponentFixture } from '@angular/core/testing';
import { beforeEach, describe, expect, it, jest } from '@jest/globals';
import type { PlanMark, PlanVector } from './plan-content';
import { ScalePlan } from './scale-plan';

// The drawing itself needs a canvas, which jsdom has not; it is looked at in the browser suite.
jest.spyOn(HTMLCanvasElement.prototype, 'getContext').mockReturnValue(null);

const mark = (id: string, at: [number, number]): PlanMark => ({
  id,
  label: id.toUpperCase(),
  kind: 'gouge',
  at,
  covariance: [
    [0.0004, 0],
    [0, 0.0004],
  ],
  trace: null,
  order: null,
});

let fixture: ComponentFixture<ScalePlan>;
let root: HTMLElement;

beforeEach(() => {
  fixture = TestBed.createComponent(ScalePlan);
  root = fixture.nativeElement as HTMLElement;
  fixture.componentRef.setInput('label', 'Plan of the test');
  fixture.componentRef.setInput('marks', [mark('a', [1, 2]), mark('b', [3, -4.5])]);
});

const plan = (): HTMLElement => {
  const found = root.querySelector<HTMLElement>('[role="application"]');
  if (!found) throw new Error('no plan');
  return found;
};
const press = async (key: string): Promise<void> => {
  plan().dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
  await fixture.whenStable();
};
const said = (): string => root.querySelector('[role="status"]')?.textContent ?? '';

describe('the scale plan', () => {
  it('says what it shows and how it is used without a mouse', async () => {
    await fixture.whenStable();
    expect(plan().getAttribute('aria-label')).toBe('Plan of the test');
    expect(plan().tabIndex).toBe(0);
    const help = root.querySelector(`#${plan().getAttribute('aria-describedby') ?? ''}`);
    expect(help?.textContent).toMatch(/Arrow keys move the plan/);
  });

  it('goes from mark to mark by the brackets and says which one it is', async () => {
    await fixture.whenStable();
    await press(']');
    expect(fixture.componentInstance.selected()).toBe('a');
    expect(said()).toBe('A, gouge, x 1.000 m, y 2.000 m');
    await press(']');
    expect(said()).toBe('B, gouge, x 3.000 m, y −4.500 m');
    await press(']');
    expect(fixture.componentInstance.selected()).toBe('a');
    await press('[');
    expect(fixture.componentInstance.selected()).toBe('b');
    await press('Escape');
    expect(fixture.componentInstance.selected()).toBeNull();
  });

  it('leaves keys that are not its own alone', async () => {
    await fixture.whenStable();
    const event = new KeyboardEvent('keydown', { key: 'Tab', cancelable: true });
    plan().dispatchEvent(event);
    expect(event.defaultPrevented).toBe(false);
  });

  it('states grid, scale, ellipses, and north or the axes', async () => {
    await fixture.whenStable();
    expect(root.textContent).toMatch(/grid \d+ m/);
    expect(root.textContent).toMatch(/ellipses 95 %, to scale/);
    expect(root.querySelector('.north title')?.textContent).toMatch(/^Axes/);
    fixture.componentRef.setInput('ellipseScale', 10);
    // +x to the east (bearing 90°): north is up, and the arrow is not turned.
    fixture.componentRef.setInput('xAxisBearing', Math.PI / 2);
    await fixture.whenStable();
    expect(root.textContent).toMatch(/drawn 10 times too large/);
    expect(root.querySelector('.north title')?.textContent).toBe('North');
    expect(root.querySelector('.north g')?.getAttribute('transform')).toBe('rotate(0)');
  });

  it('gives velocities and relative velocities one scale, accelerations their own', async () => {
    const vector = (kind: PlanVector['kind'], value: [number, number]): PlanVector => ({
      id: kind,
      kind,
      from: [0, 0],
      value,
      label: kind,
    });
    fixture.componentRef.setInput('vectors', [
      vector('velocity', [16, 0]),
      vector('relative', [0, 2]),
      vector('acceleration', [3, 4]),
    ]);
    await fixture.whenStable();
    const keys = [...root.querySelectorAll('.key')].map((key) =>
      key.textContent.trim().replace(/\s+/g, ' '),
    );
    expect(keys).toEqual(['velocity 10 m/s', 'relative velocity 10 m/s', 'acceleration 2 m/s²']);
    fixture.componentRef.setInput('largest', { velocity: 45 });
    await fixture.whenStable();
    expect(root.querySelector('.key')?.textContent).toMatch(/velocity 20 m\/s/);
  });
});
