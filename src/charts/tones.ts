/** How a mark stands to what it is compared with; each differs by shape, and colour only helps. */
export type Tone = "higher" | "lower" | "none" | "plain";

export const toneStroke: Record<Tone, string> = {
  higher: "stroke-higher",
  lower: "stroke-lower",
  none: "stroke-none",
  plain: "stroke-action",
};

export const toneFill: Record<Tone, string> = {
  higher: "fill-higher",
  lower: "fill-lower",
  none: "fill-paper",
  plain: "fill-action",
};
