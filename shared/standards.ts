/** A published standard population: bands of whole years of age, `to` null for no upper end, and their weights. */
export interface Standard {
  id: string;
  label: string;
  source: string;
  bands: readonly { from: number; to: number | null; weight: number }[];
}

/** Bands of equal width from `first`, the last one open. */
function evenBands(first: number, width: number, weights: readonly number[]): Standard["bands"] {
  return weights.map((weight, index) => {
    const from = first + index * width;
    return { from, to: index === weights.length - 1 ? null : from + width - 1, weight };
  });
}

const WHO = [8.86, 8.69, 8.6, 8.47, 8.22, 7.93, 7.61, 7.15, 6.59, 6.04, 5.37, 4.55, 3.72, 2.96, 2.21, 1.52, 0.91, 0.63];
const EUROPE = [5000, 5500, 5500, 5500, 6000, 6000, 6500, 7000, 7000, 7000, 7000, 6500, 6000, 5500, 5000, 4000, 2500, 1500, 1000];
const KLEIN =
  "Klein RJ, Schoenborn CA. Age adjustment using the 2000 projected U.S. population. Healthy People 2010 Statistical Notes No. 20, NCHS, 2001";

/** Built-in standards with their published weights, which need not sum to 1: `weightsForBands` normalises. */
export const STANDARDS: readonly Standard[] = [
  {
    id: "who-2000-2025",
    label: "WHO world standard 2000–2025",
    source:
      "Ahmad OB, Boschi-Pinto C, Lopez AD, Murray CJL, Lozano R, Inoue M. Age standardization of rates: a new WHO standard. GPE Discussion Paper 31, WHO, 2001",
    // As printed they sum to 100.03.
    bands: evenBands(0, 5, WHO),
  },
  {
    id: "europe-2013",
    label: "European standard population 2013",
    source: "Eurostat. Revision of the European standard population, 2013",
    bands: evenBands(0, 5, EUROPE),
  },
  {
    id: "us-2000",
    label: "US 2000 standard population, 11 groups",
    source: KLEIN,
    bands: [
      { from: 0, to: 0, weight: 0.013818 },
      { from: 1, to: 4, weight: 0.055317 },
      ...[0.145565, 0.138646, 0.135573, 0.162613, 0.134834, 0.087247, 0.066037, 0.044842].map((weight, index) => ({
        from: 5 + 10 * index,
        to: 14 + 10 * index,
        weight,
      })),
      { from: 85, to: null, weight: 0.015508 },
    ],
  },
  {
    id: "us-2000-adults-5",
    label: "US 2000 standard population, adults in five groups",
    source: `${KLEIN} (distribution 9)`,
    bands: [
      { from: 18, to: 24, weight: 0.12881 },
      { from: 25, to: 34, weight: 0.182648 },
      { from: 35, to: 44, weight: 0.219077 },
      { from: 45, to: 64, weight: 0.299194 },
      { from: 65, to: null, weight: 0.170271 },
    ],
  },
  {
    id: "us-2000-adults-3",
    label: "US 2000 standard population, adults 20 and over in three groups",
    source: `${KLEIN}; populations in thousands`,
    bands: [
      { from: 20, to: 39, weight: 77_670 },
      { from: 40, to: 59, weight: 72_816 },
      { from: 60, to: null, weight: 45_364 },
    ],
  },
];
