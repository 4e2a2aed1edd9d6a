export type ButtonKind = "primary" | "quiet" | "plain" | "danger";

const BASE =
  "inline-flex min-h-9 items-center justify-center gap-2 rounded-sm text-[0.9375rem] font-medium whitespace-nowrap transition-colors " +
  "disabled:opacity-50 aria-disabled:opacity-60 no-print";

const KINDS: Record<ButtonKind, string> = {
  primary: "bg-action px-4 text-on-action hover:bg-action/90",
  quiet: "border border-field px-4 text-action hover:border-action hover:bg-action-soft",
  plain: "px-1 text-action underline-offset-4 hover:underline",
  danger: "border border-wrong px-4 text-wrong hover:bg-wrong hover:text-paper",
};

/** One look for buttons and for links that look like them. `primary` stands once in a view. */
export const buttonStyle = (kind: ButtonKind) => `${BASE} ${KINDS[kind]}`;
