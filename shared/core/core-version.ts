/**
 * Version of the numeric core, told beside every stored result. It is raised whenever the same
 * input and seed would give other figures than before.
 */
export const CORE_VERSION = "1";

/** The generator of random numbers behind `createStream`. */
export const GENERATOR = "xoshiro128++";
