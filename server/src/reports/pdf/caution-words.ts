/** As docs/cautions.md words them. */
export const CAUTIONS = [
  'Steam and hot condensate burn and kill; water hammer breaks pipes. Nobody opens a line, a trap or a gauge connection on the word of a calculation.',
  'Riseback computes a steady state from what was typed. It does not replace local codes (for instance the power-piping and building-services piping codes and pressure-equipment law) or a licensed engineer’s judgement.',
] as const;

/** Where the present models end. */
export const MODEL_LIMITS = [
  'The default method is the basis of the handbook tables for dry, pitched returns: vapour alone fills the bore, the liquid runs along the bottom. In full or rising lines the friction of a boiling mixture can be several times higher: the finding on the dry basis says where, and the credible band how much.',
  'The bands are between methods, not around the truth. Where they lie far apart only a gauge decides.',
  'A rise is charged by rule, as full of liquid, or by a void fraction. How hard a slug strikes, how hard steam collapses in cold water and how a cold line fills are not computed: the findings on slugs and thermal shock only say where to look.',
  'A choked pipe stands at its critical pressure by equilibrium between the phases. Short pipes flash late and pass more.',
  'Steam through a trap that has failed open is an upper bound: the condensate that shares its orifice is not taken off.',
  'Every state is steady. Discharges at their own or probable peak tell a lasting peak, not the seconds of a discharge.',
  'A check that could not be made says so; it is never a pass.',
] as const;
