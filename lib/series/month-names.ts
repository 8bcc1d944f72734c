/**
 * Month names in the languages that spreadsheets of analysts most often speak, as prefixes without accents, lower case.
 * A name matches a month when it is one of the listed words or a longer beginning of its full form.
 */

/** Per month: full names, then short forms that are no beginning of a full name. */
const NAMES: readonly string[][] = [
  ['january', 'januar', 'janvier', 'enero', 'gennaio', 'janeiro', 'januari'],
  ['february', 'februar', 'fevrier', 'febrero', 'febbraio', 'fevereiro', 'februari'],
  ['march', 'marz', 'maerz', 'mars', 'marzo', 'marco', 'maart', 'mrz', 'mrt'],
  ['april', 'avril', 'abril', 'aprile'],
  ['may', 'mai', 'mayo', 'maggio', 'maio', 'mei'],
  ['june', 'juni', 'juin', 'junio', 'giugno', 'junho'],
  ['july', 'juli', 'juillet', 'julio', 'luglio', 'julho'],
  ['august', 'aout', 'agosto', 'augustus'],
  ['september', 'septembre', 'septiembre', 'settembre', 'setembro', 'sept'],
  ['october', 'oktober', 'octobre', 'octubre', 'ottobre', 'outubro'],
  ['november', 'novembre', 'noviembre', 'novembro'],
  ['december', 'dezember', 'decembre', 'diciembre', 'dicembre', 'dezembro'],
];

/** Shortest beginning of a name that is taken for it; "jui" would be June or July. */
const SHORTEST_PREFIX = 3;

/** 1 to 12, or null when the word is no month or could be two. */
export function monthOfYearFromName(word: string): number | null {
  const plain = word.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase();
  if (plain.length < SHORTEST_PREFIX) return null;
  const matches = NAMES.flatMap((names, index) =>
    names.some((name) => name.startsWith(plain)) ? [index + 1] : [],
  );
  return matches.length === 1 ? matches[0] : null;
}
