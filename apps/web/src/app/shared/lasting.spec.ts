import { type Signal, signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { lasting } from './lasting';

describe('lasting', () => {
  const source = signal(false);
  let long: Signal<boolean>;

  beforeEach(() => {
    vi.useFakeTimers();
    source.set(false);
    long = TestBed.runInInjectionContext(() => lasting(source, 200));
  });
  afterEach(() => vi.useRealTimers());

  const set = (value: boolean): void => {
    source.set(value);
    TestBed.tick();
  };

  it('is true only after its source has been so for long enough, and ends with it', () => {
    set(true);
    vi.advanceTimersByTime(199);
    expect(long()).toBe(false);
    vi.advanceTimersByTime(1);
    expect(long()).toBe(true);
    source.set(false);
    expect(long()).toBe(false);
  });

  it('says nothing of what is over sooner, and counts each time anew', () => {
    set(true);
    vi.advanceTimersByTime(150);
    set(false);
    set(true);
    vi.advanceTimersByTime(150);
    expect(long()).toBe(false);
    vi.advanceTimersByTime(50);
    expect(long()).toBe(true);
  });
});
