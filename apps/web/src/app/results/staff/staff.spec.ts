import { TestBed } from '@angular/core/testing';
import type { TrapResult } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { Staff } from './staff';

const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const trap: TrapResult = {
  id: 'T1',
  backPressurePa: 139_409,
  receiverPressurePa: 101_325,
  staticPa: 34_474,
  frictionPa: 27,
  flashPa: 3_583,
  differentialPa: 478_591,
  handCheck: { staticPa: 34_474, backPressurePa: 135_799 },
  walk: ['L1'],
  checks: [],
  notChecked: [],
};

async function staff(inputs: Record<string, unknown>): Promise<HTMLElement> {
  const fixture = TestBed.createComponent(Staff);
  const all = { trap, inletPressurePa: 618_000, units, ...inputs };
  for (const [name, value] of Object.entries(all)) fixture.componentRef.setInput(name, value);
  await fixture.whenStable();
  return fixture.nativeElement as HTMLElement;
}

describe('Staff', () => {
  it.each(['tall', 'flat'])('is one picture with one sentence (%s)', async (orientation) => {
    const element = await staff({ orientation, limitPa: 300_000, scaleMaximumPa: null });
    const picture = element.querySelector('[role=img]');
    expect(picture?.getAttribute('aria-label')).toContain('Back pressure 5.5 psig against 74.9 psig');
    expect(element.querySelectorAll('svg')).toHaveLength(1);
    expect(element.querySelector('.pointer')).not.toBeNull();
  });

  it('prints ten feet of lift as five psi, beside the one number', async () => {
    const element = await staff({ orientation: 'tall' });
    const words = [...element.querySelectorAll('text')].map(({ textContent }) => textContent.trim());
    expect(words).toEqual(
      expect.arrayContaining(['Lift, 10 ft', '5.00', 'Back pressure', '5.5', 'psig', 'Differential', '69.4']),
    );
  });

  it('never lets two labels overlap, whatever stands behind the trap', async () => {
    for (const backPressurePa of [101_400, 139_409, 400_000, 617_900, 700_000]) {
      const element = await staff({ orientation: 'tall', trap: { ...trap, backPressurePa } });
      const heights = [...element.querySelectorAll('text.name')]
        .map((text) => Number(text.getAttribute('y')))
        .sort((a, b) => a - b);
      expect(heights).toHaveLength(7);
      heights.forEach((y, i) => expect(y - (heights[i - 1] ?? -99)).toBeGreaterThan(15));
    }
  });

  it('draws the bands beside the tube or under it, and only where they are computed', async () => {
    const bands = { spread: { lowPa: 120_000, highPa: 446_000 }, credible: { lowPa: 135_000, highPa: 170_000 } };
    for (const orientation of ['tall', 'flat']) {
      const plain = await staff({ orientation });
      expect(plain.querySelector('.spread, .credible')).toBeNull();
      const banded = await staff({ orientation, trap: { ...trap, ...bands } });
      expect(banded.querySelectorAll('path.spread, rect.credible, path.credible')).toHaveLength(2);
    }
    const tall = await staff({ orientation: 'tall', trap: { ...trap, ...bands } });
    const words = [...tall.querySelectorAll('text')].map(({ textContent }) => textContent.trim());
    // psig: 18,675/6,894.757 = 2.7, 344,675/6,894.757 = 50.0; 4.9, 10.0
    expect(words).toEqual(expect.arrayContaining(['Spread', '2.7 to 50.0', 'Credible', '4.9 to 10.0']));
  });
});
