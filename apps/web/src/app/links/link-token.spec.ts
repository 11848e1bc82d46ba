import { Location } from '@angular/common';
import { Component } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { provideRouter, Router } from '@angular/router';
import { RouterTestingHarness } from '@angular/router/testing';
import { beforeEach, describe, expect, it } from 'vitest';
import { LinkToken, takeToken } from './link-token';

@Component({ selector: 'app-blank', template: '' })
class Blank {}

describe('takeToken', () => {
  let harness: RouterTestingHarness;

  beforeEach(async () => {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([
          { path: 'invitation', canActivate: [takeToken], runGuardsAndResolvers: 'always', component: Blank },
        ]),
      ],
    });
    harness = await RouterTestingHarness.create();
  });

  const token = () => TestBed.inject(LinkToken).value();
  const address = () => TestBed.inject(Location).path(true);

  it('keeps the token and leaves nothing of it in the address or the router', async () => {
    await harness.navigateByUrl('/invitation#first');
    expect(token()).toBe('first');
    expect(address()).toBe('/invitation');
    expect(TestBed.inject(Router).url).toBe('/invitation');
  });

  it('takes the token of another link that is opened in the same tab, and of the same one once more', async () => {
    await harness.navigateByUrl('/invitation#first');
    await harness.navigateByUrl('/invitation#second');
    expect(token()).toBe('second');
    await harness.navigateByUrl('/invitation#second');
    expect(address()).toBe('/invitation');
  });

  it('comes without a token when the page is loaded anew', async () => {
    await harness.navigateByUrl('/invitation');
    expect(token()).toBeNull();
  });
});
