import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { emptyDocument, type NetworkDocument } from '@riseback/network';
import { beforeEach, describe, expect, it } from 'vitest';
import { NetworkStore } from '../networks/network-store';
import { MethodPage } from './method-page';

describe('MethodPage', () => {
  const document = signal<NetworkDocument>(emptyDocument('Hall'));
  let element: HTMLElement;
  const used = () => [...element.querySelectorAll('.one.used h3')].map((heading) => heading.textContent.trim());

  beforeEach(async () => {
    document.set(emptyDocument('Hall'));
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        {
          provide: NetworkStore,
          useValue: { document, units: () => ({ system: 'si', atmosphericPressurePa: 101_325 }) },
        },
      ],
    });
    const fixture = TestBed.createComponent(MethodPage);
    await fixture.whenStable();
    element = fixture.nativeElement as HTMLElement;
  });

  it('marks what the network uses, and follows when it chooses otherwise', () => {
    expect(used()).toEqual(['Flash vapour', 'Half a psi per foot', 'All traps at their load']);
    const { method } = document();
    document.set({ ...document(), method: { ...method, friction: 'friedel', staticLift: 'twoPhase' } });
    TestBed.tick();
    expect(used()).toEqual(['Friedel', 'Two-phase risers', 'Rouhani and Axelsson', 'All traps at their load']);
  });

  it('draws equations as MathML', () => {
    const fractions = element.querySelectorAll('#friction-friedel math mfrac');
    expect(fractions.length).toBeGreaterThan(5);
    expect(fractions[0]?.namespaceURI).toBe('http://www.w3.org/1998/Math/MathML');
  });

  it('shows the network’s own limit beside the default', () => {
    document.set({ ...document(), limits: { velocity: { watchMS: 20 } } });
    TestBed.tick();
    const row = element.querySelector('#check-velocity tbody tr');
    expect([...(row?.querySelectorAll('td') ?? [])].slice(1, 3).map((cell) => cell.textContent.trim())).toEqual([
      '25 m/s',
      '20 m/s',
    ]);
  });

  it('has a target for every link of its contents', () => {
    const fragments = [...element.querySelectorAll<HTMLAnchorElement>('a[href*="#"]')].map(({ hash }) => hash.slice(1));
    expect(fragments.length).toBeGreaterThan(40);
    expect(fragments.filter((id) => element.querySelector(`[id="${id}"]`) === null)).toEqual([]);
  });
});
