import { Component, signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { beforeEach, describe, expect, it } from 'vitest';
import { QuantityField } from './quantity-field';

@Component({
  imports: [QuantityField],
  template: `<app-quantity-field
    label="Elevation"
    kind="length"
    [units]="{ system: system(), atmosphericPressurePa: 101325 }"
    [value]="value()"
    [optional]="optional()"
    (accepted)="accept($event)"
  />`,
})
class Host {
  readonly value = signal<number | undefined>(3.048);
  readonly system = signal<'us' | 'si'>('us');
  readonly optional = signal(false);
  readonly taken: (number | undefined)[] = [];

  accept(si: number | undefined): void {
    this.taken.push(si);
    this.value.set(si);
  }
}

describe('QuantityField', () => {
  let host: Host;
  let box: HTMLInputElement;
  let stable: () => Promise<void>;
  let text: () => string;

  beforeEach(async () => {
    const fixture = TestBed.createComponent(Host);
    host = fixture.componentInstance;
    await fixture.whenStable();
    const element = fixture.nativeElement as HTMLElement;
    const found = element.querySelector('input');
    if (found === null) throw new Error('no box');
    box = found;
    stable = () => fixture.whenStable();
    text = () => element.textContent;
  });

  const type = async (typed: string) => {
    box.dispatchEvent(new Event('focus'));
    box.value = typed;
    box.dispatchEvent(new Event('input'));
    await stable();
  };
  const press = async (key: string) => {
    box.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
    await stable();
  };

  it('shows the value in the person’s unit', async () => {
    expect(Number(box.value)).toBe(10);
    host.system.set('si');
    await stable();
    expect(Number(box.value)).toBe(3.048);
  });

  it('takes a typed unit and hands on SI', async () => {
    await type('12 ft');
    await press('Enter');
    expect(host.taken).toEqual([3.6576]);
  });

  it('keeps a text of the wrong dimension in the box, with the reason', async () => {
    await type('12 psig');
    await press('Enter');
    expect(host.taken).toEqual([]);
    expect(box.value).toBe('12 psig');
    expect(box.getAttribute('aria-invalid')).toBe('true');
    expect(text()).toContain('pressure');
  });

  it('restores on Escape', async () => {
    await type('99');
    await press('Escape');
    expect(Number(box.value)).toBe(10);
    box.dispatchEvent(new Event('blur'));
    expect(host.taken).toEqual([]);
  });

  it('accepts nothing when nothing was changed', async () => {
    await type('10');
    box.dispatchEvent(new Event('blur'));
    await stable();
    expect(host.taken).toEqual([]);
  });

  it('may be emptied only where it is optional', async () => {
    await type('');
    await press('Enter');
    expect(host.taken).toEqual([]);
    host.optional.set(true);
    await stable();
    await type('');
    await press('Enter');
    expect(host.taken).toEqual([undefined]);
  });
});
