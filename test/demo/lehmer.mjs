/**
 * Seeded pseudo-random numbers that come out alike on every machine.
 *
 * Generator: Park & Miller (1988), Comm. ACM 31, 1192: x <- 16807 x mod (2^31 - 1). Every product stays below 2^53.
 * Normal deviates: Box & Muller (1958), Ann. Math. Stat. 29, 610, cosine branch.
 */
const MULTIPLIER = 16807;
const MODULUS = 2147483647;
/** Near-equal seeds give near-equal first numbers: these are thrown away. */
const DISCARDED = 24;

/**
 * @typedef {object} Lehmer
 * @property {() => number} uniform in (0, 1)
 * @property {(low: number, high: number) => number} between uniform in (low, high)
 * @property {() => number} normal mean 0, standard deviation 1
 */

/**
 * @param {number} seed integer, 1 to 2^31 - 2
 * @returns {() => number} the next state of the generator at each call
 */
export function createLehmerStates(seed) {
  let state = seed;
  return () => {
    state = (MULTIPLIER * state) % MODULUS;
    return state;
  };
}

/**
 * @param {string} seedText anything; its hash is the seed
 * @returns {Lehmer}
 */
export function createLehmer(seedText) {
  const next = createLehmerStates(hashToSeed(seedText));
  for (let i = 0; i < DISCARDED; i += 1) next();
  const uniform = () => next() / MODULUS;
  return {
    uniform,
    between: (low, high) => low + (high - low) * uniform(),
    normal: () => {
      const radius = Math.sqrt(-2 * Math.log(uniform()));
      return radius * Math.cos(2 * Math.PI * uniform());
    },
  };
}

/** FNV-1a of the text, brought into the generator's range. @param {string} text */
function hashToSeed(text) {
  let hash = 0x811c9dc5;
  for (let i = 0; i < text.length; i += 1) hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193);
  return ((hash >>> 0) % (MODULUS - 2)) + 1;
}
