import type { Attribute } from "./person.ts";
import { DISTRICTS, SETTLEMENTS } from "./places.ts";

/** Codes for an answer that isn't there. */
export const NOT_ASKED = "97";
export const DOES_NOT_KNOW = "98";
export const REFUSED = "99";

/** A variable of the demo's microdata, as its codebook describes it. */
export interface DemoVariable {
  name: string;
  label: string;
  kind: "categorical" | "numeric" | "text";
  /** What the value is taken from; null for those that the sample itself makes. */
  attribute: Attribute | null;
  categories: { code: string; label: string; isMissing: boolean }[];
  /** Shares of respondents who don't know, refuse, or were not asked (an empty field). */
  missing: { doesNotKnow: number; refused: number; empty: number };
}

const MISSING_LABELS = { [DOES_NOT_KNOW]: "Does not know", [REFUSED]: "Refused" };

interface Absences {
  doesNotKnow?: number;
  refused?: number;
  empty?: number;
}

function codes(labels: readonly string[]): DemoVariable["categories"] {
  return labels.map((label, index) => ({ code: String(index + 1), label, isMissing: false }));
}

function variable(
  name: string,
  label: string,
  kind: DemoVariable["kind"],
  attribute: Attribute | null,
  labels: readonly string[] = [],
  { doesNotKnow = 0, refused = 0, empty = 0 }: Absences = {},
): DemoVariable {
  const named = doesNotKnow + refused > 0 ? Object.entries(MISSING_LABELS) : [];
  return {
    name,
    label,
    kind,
    attribute,
    categories: [...codes(labels), ...named.map(([code, text]) => ({ code, label: text, isMissing: true }))],
    missing: { doesNotKnow, refused, empty },
  };
}

/** The variables of every wave, in the order of the file. */
export function demoVariables(strata: readonly { code: string; label: string }[]): DemoVariable[] {
  const stratum = variable("stratum", "Stratum: district and kind of settlement", "categorical", null);
  stratum.categories = strata.map(({ code, label }) => ({ code, label, isMissing: false }));
  const triedToQuit = variable(
    "tried_to_quit",
    "Tried to stop smoking in the last 12 months",
    "categorical",
    "triedToQuit",
    ["Yes", "No"],
    {
      doesNotKnow: 0.01,
      refused: 0.008,
    },
  );
  triedToQuit.categories.push({ code: NOT_ASKED, label: "Not asked: not known to smoke", isMissing: true });
  return [
    variable("respondent", "Respondent's number", "text", null),
    stratum,
    variable("psu", "Primary sampling unit: town block, village or remote place", "text", null),
    variable("weight", "Weight: design and non-response", "numeric", null),
    variable("district", "District", "categorical", "district", DISTRICTS),
    variable("settlement", "Kind of settlement", "categorical", "settlement", SETTLEMENTS),
    variable("sex", "Sex", "categorical", "sex", ["Women", "Men"]),
    variable("age", "Age in years", "numeric", "age"),
    variable(
      "education",
      "Schooling completed",
      "categorical",
      "education",
      ["Primary or none", "Lower secondary", "Upper secondary", "Beyond secondary"],
      { doesNotKnow: 0.006, refused: 0.009 },
    ),
    variable(
      "work",
      "Main activity",
      "categorical",
      "work",
      ["In paid work", "Looking for work", "In education", "At home or caring", "Retired", "Unable to work through illness"],
      { doesNotKnow: 0.004, refused: 0.008 },
    ),
    variable(
      "income",
      "Household income for each member, in fifths",
      "categorical",
      "income",
      ["Poorest fifth", "Second fifth", "Third fifth", "Fourth fifth", "Richest fifth"],
      { doesNotKnow: 0.02, refused: 0.038 },
    ),
    variable("household_size", "People in the household", "numeric", "household"),
    variable("health", "Own health, in general", "categorical", "health", ["Very good", "Good", "Fair", "Poor", "Very poor"], {
      doesNotKnow: 0.005,
      refused: 0.006,
    }),
    variable("smoking", "Smoking now", "categorical", "smoking", ["Daily", "Less than daily", "Formerly", "Never"], {
      doesNotKnow: 0.004,
      refused: 0.009,
    }),
    triedToQuit,
    variable(
      "blood_pressure",
      "Last time blood pressure was checked",
      "categorical",
      "bloodPressure",
      ["In the last 12 months", "1 to 2 years ago", "Not in two years"],
      { doesNotKnow: 0.022, refused: 0.005 },
    ),
    variable("flu_vaccination", "Vaccinated against flu in the last 12 months", "categorical", "fluVaccination", ["Yes", "No"], {
      doesNotKnow: 0.012,
      refused: 0.006,
    }),
    variable(
      "activity",
      "Physical activity in a usual week",
      "categorical",
      "activity",
      ["Inactive", "Some, under 150 minutes", "150 minutes or more"],
      { doesNotKnow: 0.018, refused: 0.006 },
    ),
    variable("distress", "Distress score, 0 (none) to 40", "numeric", "distress", [], {
      doesNotKnow: 0.006,
      refused: 0.014,
      empty: 0.02,
    }),
    variable("doctor_visits", "Visits to a doctor in the last three months", "numeric", "doctorVisits", [], {
      doesNotKnow: 0.016,
      refused: 0.004,
    }),
    variable(
      "care_forgone",
      "Went without care in the last 12 months because of its cost",
      "categorical",
      "careForgone",
      ["Yes", "No"],
      {
        doesNotKnow: 0.007,
        refused: 0.006,
      },
    ),
  ];
}
