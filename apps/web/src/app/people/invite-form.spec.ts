import { type ComponentFixture, TestBed } from '@angular/core/testing';
import type { NewInvitation } from '@riseback/contracts';
import { beforeEach, describe, expect, it } from 'vitest';
import { InviteForm } from './invite-form';
import { PeopleStore } from './people-store';

describe('InviteForm', () => {
  let fixture: ComponentFixture<InviteForm>;
  let sent: NewInvitation[];
  let told: string[];
  const element = () => fixture.nativeElement as HTMLElement;
  const box = () => {
    const found = element().querySelector('textarea');
    if (found === null) throw new Error('no box');
    return found;
  };

  async function invite(text: string): Promise<void> {
    box().value = text;
    box().dispatchEvent(new Event('input'));
    await fixture.whenStable();
    element().querySelector('form')?.dispatchEvent(new Event('submit'));
    await new Promise((resolve) => setTimeout(resolve));
    await fixture.whenStable();
  }

  beforeEach(async () => {
    [sent, told] = [[], []];
    const problem = { type: '/problems/conflict', title: 'Refused', status: 409, detail: 'has a role here already' };
    const store = {
      invite: (invitation: NewInvitation) => {
        sent.push(invitation);
        return Promise.resolve(invitation.email.startsWith('ida') ? { problem } : { value: undefined });
      },
      reload: () => undefined,
    };
    TestBed.configureTestingModule({ providers: [{ provide: PeopleStore, useValue: store }] });
    fixture = TestBed.createComponent(InviteForm);
    fixture.componentInstance.told.subscribe((words) => told.push(words));
    await fixture.whenStable();
  });

  it('sends each good line and keeps the others with what is wrong with them', async () => {
    await invite('bo@quay.example\nnobody\nida@quay.example');
    expect(sent.map(({ email }) => email)).toEqual(['bo@quay.example', 'ida@quay.example']);
    expect(box().value).toBe('nobody\nida@quay.example');
    const mistakes = [...element().querySelectorAll('.mistakes p')].map((line) =>
      line.textContent.replaceAll(/\s+/g, ' ').trim(),
    );
    expect(mistakes).toEqual([
      'Line 1, nobody: is not an e-mail address',
      'Line 2, ida@quay.example: has a role here already',
    ]);
    expect(told).toEqual(['1 invitation is on its way. 2 lines need mending.']);
  });

  it('asks for an address when there is none, and tells nobody anything', async () => {
    await invite(' \n');
    expect(element().querySelector('.mistakes')?.textContent).toContain('Give an e-mail address.');
    expect([sent, told]).toEqual([[], []]);
  });
});
