import { beforeEach, describe, expect, it } from '@jest/globals';
import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { ChangeDetectionStrategy, Component, signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness } from '@angular/material/input/testing';
import { QuantityField } from './quantity-field';
import { UnreadFields } from './unread-fields';

@Component({
  selector: 'app-host',
  imports: [QuantityField],
  template: `
    <app-quantity-field
      label="Speed"
      dimension="speed"
      unit="km/h"
      sign="not-negative"
      [(value)]="value"
      [fault]="fault()"
    />
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
class Host {
  readonly value = signal<number | null>(14.20169);
  readonly fault = signal<string | undefined>(undefined);
}

describe('a quantity field', () => {
  let host: Host;
  let loader: HarnessLoader;
  let input: MatInputHarness;
  let field: MatFormFieldHarness;

  beforeEach(async () => {
    TestBed.configureTestingModule({ providers: [UnreadFields] });
    const fixture = TestBed.createComponent(Host);
    host = fixture.componentInstance;
    loader = TestbedHarnessEnvironment.loader(fixture);
    input = await loader.getHarness(MatInputHarness);
    field = await loader.getHarness(MatFormFieldHarness);
  });

  it('writes a value in its unit and does not change it by that', async () => {
    expect(await input.getValue()).toBe('51.12608 km/h');
    expect(host.value()).toBe(14.20169);
  });

  it('takes another unit, with the value in its own beside it', async () => {
    await input.setValue('45 mph');
    // 1 mph is 1.609344 km/h exactly.
    expect(host.value()).toBeCloseTo((45 * 1609.344) / 3600, 9);
    expect(await field.getTextHints()).toEqual(['= 72.4205 km/h']);
  });

  it('keeps a text that it cannot read, says why, and changes nothing', async () => {
    await input.setValue('fast');
    expect(host.value()).toBe(14.20169);
    expect(await input.getValue()).toBe('fast');
    expect(await field.getTextErrors()).toEqual(['"fast" is not a number with a unit.']);
    expect(TestBed.inject(UnreadFields).any()).toBe(true);
    await input.setValue('10 m/s');
    expect(TestBed.inject(UnreadFields).any()).toBe(false);
    expect(host.value()).toBe(10);
  });

  it('refuses what is below zero where that cannot be', async () => {
    await input.setValue('-3 m/s');
    expect(await field.getTextErrors()).toEqual(['This cannot be negative.']);
    expect(host.value()).toBe(14.20169);
  });

  it('shows what the engine says beside the field', async () => {
    host.fault.set('A speed of zero has no direction.');
    expect(await field.getTextErrors()).toEqual(['A speed of zero has no direction.']);
  });

  it('follows a value that is changed elsewhere', async () => {
    host.value.set(10);
    expect(await input.getValue()).toBe('36 km/h');
  });
});
