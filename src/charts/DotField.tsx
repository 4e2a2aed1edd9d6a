const DOTS = Array.from({ length: 100 }, (_, index) => index);
const STEP = 17;

const LOOKS = {
  sure: "fill-higher stroke-higher",
  estimated: "fill-higher-text stroke-ink",
  possible: "fill-higher/25 stroke-higher",
  rest: "fill-transparent stroke-field/70",
} as const;

/** Of 100 people: filled up to the low limit, dark up to the estimate, pale up to the high limit. Whole dots, as in the sentence beside it. */
export function DotField({ estimate, low, high, text }: { estimate: number; low: number; high: number; text: string }) {
  const [sure, about, possible] = [low, estimate, high].map((share) => Math.round(100 * share));
  const look = (index: number) => {
    if (index < (sure ?? 0)) return LOOKS.sure;
    if (index < (about ?? 0)) return LOOKS.estimated;
    return index < (possible ?? 0) ? LOOKS.possible : LOOKS.rest;
  };
  return (
    <figure>
      <svg role="img" aria-label={text} viewBox="0 0 170 170" className="block w-full max-w-[10.625rem]">
        {DOTS.map((index) => (
          <circle
            key={index}
            cx={8.5 + STEP * (index % 10)}
            cy={8.5 + STEP * Math.floor(index / 10)}
            r="6"
            strokeWidth="1.2"
            className={look(index)}
          />
        ))}
      </svg>
      <figcaption className="mt-2 text-[0.8125rem] text-muted">
        filled: at least {sure} · dark: up to the estimate · pale: possibly up to {possible}
      </figcaption>
    </figure>
  );
}
