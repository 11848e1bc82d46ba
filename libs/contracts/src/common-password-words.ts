/** What people build passwords of when they must fill twelve characters: one guess each. Common practice; lower case. */
export const COMMON_PASSWORD_WORDS: readonly string[] = `
  password passwort passwd motdepasse contrasena contraseña parola senha wachtwoord haslo lozinka пароль 密码 パスワード
  qwerty qwertz azerty letmein welcome willkommen bienvenue iloveyou loveyou love changeme change default secret
  geheim login logon admin administrator root user guest test testing temp temporary trustno access account
  computer internet network server system windows office company business manager service support security
  master superman batman spiderman starwars pokemon dragon monkey shadow sunshine princess angel flower
  football baseball basketball hockey soccer liverpool chelsea arsenal barcelona yankees ranger hunter killer
  charlie michael jordan daniel thomas robert jessica jennifer michelle ashley nicole andrew george matthew
  summer winter spring autumn january february march april june july august september october november december
  monday tuesday wednesday thursday friday saturday sunday hello goodbye please thanks whatever nothing freedom
  cheese chocolate cookie banana pepper ginger tiger lion eagle falcon purple orange yellow silver golden diamond
  money lucky happy family friend forever mother father sister brother baby boss king queen star rock
  correct horse battery staple thequickbrownfox maytheforce tobeornottobe
  riseback steam condensate boiler trap header pressure plant engineer engineering design designer commissioning
  reviewer viewer demo
  the and you my is one two
`
  .trim()
  .split(/\s+/);

/** Rows and columns of keys, walked in either direction. */
export const KEY_ROWS: readonly string[] = [
  'qwertyuiop',
  'qwertzuiop',
  'azertyuiop',
  'asdfghjkl',
  'zxcvbnm',
  'yxcvbnm',
  '1234567890',
  '!@#$%^&*()',
  '1qaz2wsx3edc4rfv5tgb6yhn7ujm',
  'q1w2e3r4t5y6u7i8o9p0',
];
