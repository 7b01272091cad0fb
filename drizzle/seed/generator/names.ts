import type { Rng } from "./rng.ts";

/**
 * Names put together from syllables of our own. Each manner has its own marks (accents, strokes,
 * apostrophes, doubled names, two other alphabets), because real line lists have them all.
 */
export interface Manner {
  weight: number;
  start: readonly string[];
  middle: readonly string[];
  givenEnd: readonly string[];
  familyEnd: readonly string[];
  prefix?: readonly string[];
}

const words = (text: string): readonly string[] => text.split(" ");

const MANNERS: readonly Manner[] = [
  {
    weight: 40,
    start: words("Bre Tam Hol Wen Fen Cor Lis Dar Mab Pell Quil Rud Sarn Tolv Ash Garr Ivv Nell"),
    middle: words("da vi lo mer sto fen ri quo ban wick tha lu"),
    givenEnd: words("nel ric wen sha don vey lith ma sen by"),
    familyEnd: words("croft mere holt vane stow garth linn sby combe rigg fold wray"),
  },
  {
    weight: 17,
    start: words("Hjø Ské Åsv Þru Bjy Søl Fjé Grå Ulv Tør Næv"),
    middle: words("ra lí vø ne sku má tri å"),
    givenEnd: words("dís vør na lín mek sý gar"),
    familyEnd: words("såsen víkdal fjeldur holmør strøm nessy"),
  },
  {
    weight: 16,
    start: words("Zdé Mří Vlá Kšo Pró Łuz Brů Čev Ždi Śwo"),
    middle: words("ni ro va ště lo če mi ba"),
    givenEnd: words("nek ža mír lka vít rna"),
    familyEnd: words("vičan ovřek ński áčko lník owar štov"),
  },
  {
    weight: 14,
    start: words("Xeñ Cás Ô Bré Noé Fuê Iça Quí Lóm Ãra"),
    middle: words("ra li ço ve ndo ña tre"),
    givenEnd: words("lho dès rín ça nelle mão"),
    familyEnd: words("ñedo raçal veaux quês irão dière mbès"),
  },
  {
    weight: 12,
    start: words("Kel Ni Tau Osh Ru Wai Me Adu Lio"),
    middle: words("la ke mo na ti hu se"),
    givenEnd: words("ni ta oru ka leh wo"),
    familyEnd: words("hani mekat olua rindo tawe keshu"),
    prefix: words("O' D' T' Na' M' Ke'"),
  },
  {
    weight: 1,
    start: words("Ѓур Яшт Вел Дзо Ним"),
    middle: words("ка лё ми ро"),
    givenEnd: words("на рим ша"),
    familyEnd: words("вичор ската нюк"),
  },
  {
    weight: 1,
    start: words("Θελ Ύρν Μαξ Φυλ"),
    middle: words("ί ο ά ρε"),
    givenEnd: words("νη ρος δα"),
    familyEnd: words("κίδορ ραντας μένου"),
  },
];
const TOTAL_WEIGHT = MANNERS.reduce((sum, manner) => sum + manner.weight, 0);

/** A manner of naming, by how common it is in the town. */
export function pickManner(rng: Rng): Manner {
  let rest = rng.next() * TOTAL_WEIGHT;
  for (const manner of MANNERS) {
    rest -= manner.weight;
    if (rest < 0) return manner;
  }
  return rng.pick(MANNERS);
}

function build(rng: Rng, manner: Manner, ends: readonly string[]): string {
  const middle = rng.chance(0.62) ? rng.pick(manner.middle) : "";
  return rng.pick(manner.start) + middle + rng.pick(ends);
}

/** A given name; about one in twelve is doubled with a hyphen. */
export function inventGivenName(rng: Rng, manner: Manner): string {
  const name = build(rng, manner, manner.givenEnd);
  return rng.chance(0.08) ? `${name}-${build(rng, manner, manner.givenEnd)}` : name;
}

/** A family name, at times with an elided prefix or doubled. */
export function inventFamilyName(rng: Rng, manner: Manner): string {
  const name = build(rng, manner, manner.familyEnd);
  const full = manner.prefix && rng.chance(0.6) ? rng.pick(manner.prefix) + name : name;
  if (!rng.chance(0.06)) return full;
  const second = build(rng, manner, manner.familyEnd);
  return rng.chance(0.5) ? `${full}-${second}` : `${full} ${second}`;
}

const SWAPS: readonly (readonly [string, string])[] = [
  ["ø", "o"],
  ["š", "s"],
  ["č", "ch"],
  ["ñ", "n"],
  ["é", "e"],
  ["ç", "s"],
  ["ł", "l"],
  ["'", ""],
  ["ck", "k"],
  ["qu", "kw"],
  ["ll", "l"],
  ["v", "w"],
  ["i", "y"],
  ["n", "nn"],
  ["r", "rr"],
];

/** The same name as another ear would spell it: one change, or the two parts the other way round. */
export function respellName(rng: Rng, name: string): string {
  const fitting = SWAPS.filter(([from]) => name.includes(from));
  if (fitting.length > 0 && rng.chance(0.85)) {
    const [from, to] = rng.pick(fitting);
    return name.replace(from, to);
  }
  const cut = name.indexOf(" ");
  return cut < 0 ? `${name}e` : `${name.slice(cut + 1)} ${name.slice(0, cut)}`;
}

const GROUND_FIRST = words("Gull Tarn Osier Kelp Lamp Brine Sedge Mast Tallow Wether Curlew Reed");
const GROUND_SECOND = words("stone water pole gate hook side bank well");

/** Name of a street, a yard or an outlying district. */
export function inventGroundName(rng: Rng, kinds: readonly string[]): string {
  const first = rng.pick(GROUND_FIRST);
  const second = rng.pick(GROUND_SECOND);
  return `${first}${second} ${rng.pick(kinds)}`;
}
