import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { MatDialog } from '@angular/material/dialog';
import { provideRouter, Router } from '@angular/router';
import { of } from 'rxjs';
import { beforeEach, describe, expect, it } from 'vitest';
import { Drafts } from '../networks/drafts';
import { SessionStore } from '../session/session-store';
import { SignOut } from './sign-out';

describe('SignOut', () => {
  let done: string[];
  let networks: number;
  let answer: string | undefined;

  beforeEach(() => {
    [done, networks, answer] = [[], 0, undefined];
    const note = (what: string) => Promise.resolve(void done.push(what));
    TestBed.configureTestingModule({
      providers: [
        provideRouter([{ path: 'sign-in', children: [] }]),
        { provide: SessionStore, useValue: { person: signal({ id: 'p1' }), signOut: () => note('signed out') } },
        {
          provide: Drafts,
          useValue: {
            networksOf: () => Promise.resolve(networks),
            removeAllOf: (id: string) => note(`discarded ${id} at ${TestBed.inject(Router).url}`),
          },
        },
        { provide: MatDialog, useValue: { open: () => ({ afterClosed: () => of(answer) }) } },
      ],
    });
  });

  const begin = () => TestBed.inject(SignOut).begin();

  it('asks nothing where everything is saved', async () => {
    answer = 'stay';
    await begin();
    expect(done).toEqual(['signed out']);
  });

  it('stays when the question is left unanswered', async () => {
    networks = 1;
    await begin();
    expect(done).toEqual([]);
  });

  it('keeps unsaved work unless told to discard it, and then discards it after the page has gone', async () => {
    networks = 2;
    answer = 'keep';
    await begin();
    expect(done).toEqual(['signed out']);
    answer = 'discard';
    await begin();
    expect(done.slice(1)).toEqual(['signed out', 'discarded p1 at /sign-in']);
  });
});
