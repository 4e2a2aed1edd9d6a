import type { Design } from "../../shared/contracts/design.ts";
import type { Breakdown, Question } from "../../shared/contracts/questions.ts";
import type { Rule } from "../../shared/rules.ts";
import type { CodebookVariable } from "../microdata/codebook.ts";

/** A text as an R string. */
const quote = (text: string) => JSON.stringify(text).replaceAll("\u2028", "\\u2028");
const column = (name: string) => `d[[${quote(name)}]]`;
const vector = (items: readonly string[]) => `c(${items.join(", ")})`;

type Codebook = ReadonlyMap<string, CodebookVariable>;

/** Values of a variable as numbers, missing codes as NA. */
function numbers(codebook: Codebook, name: string): string {
  const missing = (codebook.get(name)?.categories ?? []).filter(({ isMissing }) => isMissing).map(({ code }) => quote(code));
  return `num(${column(name)}, ${missing.length > 0 ? vector(missing) : "character(0)"})`;
}

/** A rule as R's logical vector, whose NA follows the same three-valued logic. */
function ruleCode(codebook: Codebook, rule: Rule): string {
  if ("all" in rule) return `(${rule.all.map((part) => ruleCode(codebook, part)).join(" & ")})`;
  if ("any" in rule) return `(${rule.any.map((part) => ruleCode(codebook, part)).join(" | ")})`;
  if ("not" in rule) return `(!${ruleCode(codebook, rule.not)})`;
  if ("between" in rule) {
    const [low, high] = rule.between;
    return `within(${numbers(codebook, rule.variable)}, ${low ?? "-Inf"}, ${high ?? "Inf"})`;
  }
  const missing = (codebook.get(rule.variable)?.categories ?? [])
    .filter(({ isMissing }) => isMissing)
    .map(({ code }) => quote(code));
  return `among(${column(rule.variable)}, ${vector(rule.in.map(quote))}, ${missing.length > 0 ? vector(missing) : "character(0)"})`;
}

/** A breakdown as a factor of its codes, bands numbered from 1, NA for those in none. */
function groupCode(codebook: Codebook, { variable, bands }: Breakdown): string {
  if (bands) {
    const ends = bands.map(([from, to]) => `c(${from ?? "-Inf"}, ${to ?? "Inf"})`);
    return `banded(${numbers(codebook, variable)}, list(${ends.join(", ")}))`;
  }
  const codes = (codebook.get(variable)?.categories ?? []).filter(({ isMissing }) => !isMissing).map(({ code }) => quote(code));
  return `factor(${column(variable)}, levels = ${vector(codes)})`;
}

function designCode(design: Design): string[] {
  const listOf = (names: string | string[] | null) => (names === null ? [] : Array.isArray(names) ? names : [names]);
  const formula = (names: string[]) => `~${names.map((name) => `\`${name}\``).join(" + ")}`;
  const psu = listOf(design.psu);
  const sizes = listOf(design.populationSize);
  const rule = { centred: "adjust", certainty: "certainty", average: "average", refuse: "fail" }[design.lonely];
  const parts = [
    psu.length > 0 ? formula(psu) : "~1",
    ...(design.strata === null ? [] : [`strata = ${formula([design.strata])}`]),
    design.weight === null ? "weights = ~one" : `weights = ${formula([design.weight])}`,
    ...(sizes.length > 0 ? [`fpc = ${formula(sizes)}`] : []),
    "data = d",
    "nest = TRUE",
  ];
  return [
    `options(survey.lonely.psu = "${rule}", survey.adjust.domain.lonely = FALSE)`,
    "d$one <- 1",
    `design <- svydesign(${parts.join(", ")})`,
  ];
}

/** Whether a script can be written for a question: crude shares and means under strata and PSUs. */
export function canReproduce(question: Question, design: Design): boolean {
  const isQuantile = "variable" in question.outcome && question.outcome.quantile !== undefined;
  return design.replicates === null && !question.standardise && question.adjustFor.length === 0 && !isQuantile;
}

/**
 * A script in the R language that works the table's cells out again from the release's CSV with the package `survey`
 * (Lumley 2004, Journal of Statistical Software 9): `Rscript table.R microdata.csv` prints key, respondents, estimate,
 * standard error and degrees of freedom of every cell and of everyone as CSV.
 * @param caption The question in words, for the reader of the script.
 */
export function reproduceScript(
  question: Question,
  design: Design,
  variables: readonly CodebookVariable[],
  caption: string,
): string {
  const codebook: Codebook = new Map(variables.map((variable) => [variable.name, variable]));
  const { outcome, among } = question;
  const breakdowns = [...question.down, ...question.across];
  const outcomeCode = "rule" in outcome ? `as.numeric(${ruleCode(codebook, outcome.rule)})` : numbers(codebook, outcome.variable);
  const numeric = [
    design.weight,
    ...(Array.isArray(design.populationSize) ? design.populationSize : [design.populationSize]),
  ].filter((name) => name !== null);
  return [
    ...caption.split("\n").map((line) => `# ${line}`),
    "# Needs R with the package survey. Usage: Rscript table.R microdata.csv",
    "suppressPackageStartupMessages(library(survey))",
    'd <- read.csv(commandArgs(TRUE)[1], colClasses = "character", check.names = FALSE, na.strings = "")',
    "num <- function(x, missing) { x[x %in% missing] <- NA; as.numeric(x) }",
    "among <- function(x, codes, missing) { x[x %in% missing] <- NA; ifelse(is.na(x), NA, x %in% codes) }",
    "within <- function(x, low, high) x >= low & x <= high",
    "banded <- function(x, bands) {",
    "  group <- rep(NA_character_, length(x))",
    "  for (i in rev(seq_along(bands))) group[!is.na(x) & x >= bands[[i]][1] & x <= bands[[i]][2]] <- as.character(i)",
    "  factor(group, levels = as.character(seq_along(bands)))",
    "}",
    `y <- ${outcomeCode}`,
    `meant <- ${among ? ruleCode(codebook, among) : "rep(TRUE, nrow(d))"}`,
    `groups <- list(${breakdowns.map((breakdown) => groupCode(codebook, breakdown)).join(", ")})`,
    ...numeric.map((name) => `${column(name)} <- as.numeric(${column(name)})`),
    ...designCode(design),
    "design <- update(design, y = y)",
    'in_cell <- meant & !is.na(meant) & !is.na(y) & weights(design, "sampling") > 0',
    "line <- function(key, rows) {",
    "  n <- sum(rows)",
    '  if (n == 0) return(cat(key, 0, "", "", "", sep = ",", "\\n"))',
    "  cell <- subset(design, rows)",
    "  mean <- svymean(~y, cell)",
    "  df <- length(unique(paste(cell$strata[, 1], cell$cluster[, 1]))) - length(unique(cell$strata[, 1]))",
    '  cat(paste(key, n, format(coef(mean), digits = 15), format(SE(mean)[1], digits = 15), df, sep = ","), "\\n", sep = "")',
    "}",
    'cat("key,respondents,estimate,se,df\\n")',
    'line("everyone", in_cell)',
    "if (length(groups) > 0) {",
    "  keys <- expand.grid(rev(lapply(groups, levels)), stringsAsFactors = FALSE)",
    "  keys <- keys[, rev(seq_along(groups)), drop = FALSE]",
    "  for (i in seq_len(nrow(keys))) {",
    "    rows <- in_cell",
    "    for (g in seq_along(groups)) rows <- rows & !is.na(groups[[g]]) & groups[[g]] == keys[i, g]",
    '    line(paste(keys[i, ], collapse = "|"), rows)',
    "  }",
    "}",
    "",
  ].join("\n");
}
