import { describe, expect, it } from 'vitest';
import { addressLines } from './address-lines';

describe('addressLines', () => {
  it('reads addresses a line each, parted by commas, and out of what a mail program copies', () => {
    const pasted = 'bo@quay.example\r\n\r\nIda Holm <ida@quay.example>; uli@quay.example ,\n';
    expect(addressLines(pasted).map(({ line, email, mistake }) => ({ line, email, mistake }))).toEqual([
      { line: 1, email: 'bo@quay.example', mistake: undefined },
      { line: 3, email: 'ida@quay.example', mistake: undefined },
      { line: 3, email: 'uli@quay.example', mistake: undefined },
    ]);
  });

  it('names the line of what is no address, and of what is there twice in whatever letters', () => {
    expect(addressLines('bo at quay\nbo@quay.example\nBO@quay.example').map(({ mistake }) => mistake)).toEqual([
      'is not an e-mail address',
      undefined,
      'stands in the list twice; leave one out',
    ]);
    expect(addressLines(' \n')).toEqual([]);
  });
});
