import { TestBed } from '@angular/core/testing';
import { beforeEach, describe, expect, it } from 'vitest';
import { GuideMemory } from './guide-memory';

describe('GuideMemory', () => {
  beforeEach(() => localStorage.clear());

  it('remembers each person of a device apart', () => {
    const memory = TestBed.inject(GuideMemory);
    memory.remember('a');
    memory.remember('a');
    expect(memory.wasOffered('a')).toBe(true);
    expect(memory.wasOffered('b')).toBe(false);
  });

  it('takes no harm from what something else has left there', () => {
    localStorage.setItem('riseback-guide-offered', '{not json');
    const memory = TestBed.inject(GuideMemory);
    expect(memory.wasOffered('a')).toBe(false);
    memory.remember('a');
    expect(memory.wasOffered('a')).toBe(true);
  });
});
