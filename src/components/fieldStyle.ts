/** One look for everything that is typed or chosen into. */
export const fieldStyle = {
  root: "flex flex-col gap-1",
  label: "text-sm font-medium",
  description: "text-sm text-muted",
  error: "text-sm text-wrong before:content-['▲_'] before:text-[0.7em]",
  input:
    "w-full min-h-10 rounded-sm border border-field bg-raised px-3 py-1.5 text-ink placeholder:text-muted " +
    "hover:border-action data-[focused]:border-action data-[invalid]:border-wrong disabled:opacity-60",
  popover:
    "max-h-80 min-w-(--trigger-width) max-w-[min(36rem,calc(100vw-1rem))] overflow-auto rounded-sm border border-line bg-raised text-ink shadow-lg shadow-ink/10",
  option:
    "cursor-pointer px-3 py-2 text-[0.9375rem] outline-none data-[focused]:bg-action-soft data-[selected]:font-medium data-[disabled]:text-muted " +
    "data-[selected]:before:content-['✓_'] data-[selected]:before:text-action",
} as const;
