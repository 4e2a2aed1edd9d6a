/** What always stands where it matters. */
export const CAUTIONS = [
  "Estimates describe groups, never a person.",
  "A wide or withheld figure isn't a small one.",
  "“No difference shown” isn't “no difference”: look at the smallest difference that this survey could have found.",
  "Association isn't cause. A group may be worse off for reasons that the survey didn't ask about.",
  "Targeting a group can stigmatise it. Involve the people it is about.",
  "Local law on data protection and ethics, and licensed professionals, decide; Perhundred doesn't replace them.",
];

export const METHODS = [
  {
    title: "Prevalence and mean",
    text: "The weighted share of a group's people who are affected, or the weighted mean of a number. Those without an answer, or without a value of a breakdown, are left out of that cell and of nothing else: every respondent stays in the design.",
    source: "Domain estimation: Binder (1983), International Statistical Review 51, 279–292.",
  },
  {
    title: "Standard errors",
    text: "By Taylor linearisation: how much the weighted totals of PSUs differ within their strata says how far the estimate may be off. With replicate weights instead, by how much the estimate moves from replicate to replicate. A population size, where the design gives one, makes the error smaller.",
    source:
      "Woodruff (1971), Journal of the American Statistical Association 66, 411–414; Binder (1983); Wolter, Introduction to Variance Estimation (2007).",
  },
  {
    title: "Intervals of a share",
    text: "Korn–Graubard intervals are the default: exact limits with the number of respondents the design is worth. They hold for small groups and for shares near none or all. Logit and Wilson intervals are close to them in large groups; the linear one is the simplest and the least trustworthy near 0 and 100.",
    source: "Korn and Graubard (1998), Survey Methodology 24, 193–201; Wilson (1927); Clopper and Pearson (1934).",
  },
  {
    title: "Differences",
    text: "A group against a reference group, the rest of the table's groups, everyone in them, or a fixed target; in percentage points, with the two sides' shared PSUs taken into account. MOVER limits are better than linear ones for small or extreme shares.",
    source: "Zou and Donner (2008), Statistics in Medicine 27, 1693–1702; Newcombe (1998), Statistics in Medicine 17, 873–890.",
  },
  {
    title: "Many comparisons at once",
    text: "In a large table some differences look clear by chance alone. Holm keeps the chance of even one such false claim at the level asked for; Benjamini and Hochberg keep their share among the claims there. Holm for a decision that rests on one cell, the other for a first look over many.",
    source:
      "Holm (1979), Scandinavian Journal of Statistics 6, 65–70; Benjamini and Hochberg (1995), Journal of the Royal Statistical Society B 57, 289–300.",
  },
  {
    title: "Degrees of freedom",
    text: "PSUs less strata, counted over those that hold a respondent of the cell. Few of them make an interval wide and unsure of its own width.",
    source: "Korn and Graubard, Analysis of Health Surveys (1999).",
  },
  {
    title: "Can the figure be read?",
    text: "Shares are judged by the steps of the NCHS data presentation standards: enough respondents, an interval that isn't too wide by itself or against the share, and enough degrees of freedom. A mean is judged by its standard error against its size.",
    source: "Parker and others (2017), Vital and Health Statistics, series 2, number 175. For means: common practice.",
  },
  {
    title: "Withheld cells",
    text: "A cell with fewer respondents, affected or unaffected than the release's minimums isn't sent. Neither is whatever else would let one work it out from margins and totals.",
    source: "Handbook on Statistical Disclosure Control (Hundepool and others 2012), chapters 4 and 5.",
  },
];

export const GLOSSARY = [
  {
    word: "Wave, release",
    meaning:
      "A wave is one round of a survey. A release is its microdata as a steward brought them in; it never changes, and a correction is another release.",
  },
  { word: "Weight", meaning: "How many people of the population a respondent stands for." },
  { word: "Stratum", meaning: "A part of the population that was sampled by itself, such as the villages of one district." },
  {
    word: "PSU",
    meaning: "Primary sampling unit: what was drawn first, such as a village or a town block; people were drawn within it.",
  },
  {
    word: "Lonely PSU",
    meaning: "The only PSU of its stratum. How far it may be off can't be seen from the data, so the steward chooses a rule.",
  },
  {
    word: "Design effect",
    meaning: "How many times larger the variance is than that of a simple random sample of the same size.",
  },
  { word: "Effective respondents", meaning: "The size of a simple random sample that would be as sure." },
  { word: "Reference group", meaning: "The group that others are compared with." },
  { word: "Detectable difference", meaning: "The true difference that this design would have found four times out of five." },
  { word: "Withheld", meaning: "Not shown, so that nobody's answers can be worked out." },
  { word: "Readiness", meaning: "A release's checks before it is published." },
  { word: "Ledger", meaning: "Who did what with which survey, and when." },
];
