import { describe, expect, it } from 'vitest';
import { normalPassword, passwordBytes, passwordMistake, personalWords } from './password-rules';

const own = personalWords({ name: 'Ines Kallan', email: 'ines.kallan@ternquay.example' });

describe('the length of a password', () => {
  // UTF-8 (RFC 3629): one byte to U+007F, two to U+07FF, three to U+FFFF, four beyond.
  it.each([
    ['abc', 3],
    ['é', 2],
    ['e\u0301', 2],
    ['€', 3],
    ['水', 3],
    ['😀', 4],
    ['\ud800', 3],
  ])('%j counts %i bytes', (text, bytes) => {
    expect(passwordBytes(text)).toBe(bytes);
  });

  it('is 12 to 72 bytes', () => {
    const letters = 'kzvwyhoatpmxbsfc'.repeat(5);
    expect(passwordMistake(letters.slice(0, 11), [])).toContain('at least 12');
    expect(passwordMistake(letters.slice(0, 12), [])).toBeUndefined();
    expect(passwordMistake(letters.slice(0, 72), [])).toBeUndefined();
    expect(passwordMistake(letters.slice(0, 73), [])).toContain('this one is 73');
    // 24 characters, but three bytes each
    expect(passwordMistake('春夏秋冬東西南北山川草木花鳥風月雨雪雲霧空海星光', [])).toBeUndefined();
    expect(passwordMistake('春夏秋冬東西南北山川草木花鳥風月雨雪雲霧空海星光土', [])).toContain('this one is 75');
  });
});

describe('a password', () => {
  it.each([
    'four plain words here',
    'кошка ест тёплый хлеб',
    'ζεστό ψωμί το πρωί',
    '水曜日は山へ行く',
    'tall gulls eat my lunch',
    'xK7#vQ2!mW9z',
    'Ines loves warm soup and rye',
    '   leading and trailing   ',
    'no digits no capitals no signs',
  ])('may be %j', (password) => {
    expect(passwordMistake(password, own)).toBeUndefined();
  });

  it.each([
    'password1234',
    'P@ssw0rd2024!',
    'passwordpassword',
    'qwertyuiop12',
    '1qaz2wsx3edc',
    'zaq12wsxcde3',
    '123456789012',
    '098765432100',
    'aaaaaaaaaaaaa',
    'abcabcabcabc',
    'xk7xk7xk7xk7',
    'letmeinletmein',
    'Welcome-2026!!',
    'Summer2024Summer',
    'correct horse battery staple',
    'administrator',
    'condensate123',
    'SteamTrap2026',
    'riseback riseback',
    'ines kallan 1234',
    'Kallan_Ternquay',
    'пароль пароль',
    '!@#$%^&*()!@#',
  ])('may not be %j', (password) => {
    expect(passwordMistake(password, own)).toContain('among the first');
  });

  it('is the same however an accent was typed', () => {
    expect(normalPassword('Cafe\u0301 au lait chaud')).toBe(normalPassword('Caf\u00e9 au lait chaud'));
    expect(normalPassword(' a b ')).toBe(' a b ');
  });
});
