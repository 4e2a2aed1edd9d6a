const SIDE = 10;
const STEP = 4;
/** Which of the hundred dots are filled: a cluster a little off the middle. */
const isFilled = (row: number, column: number) =>
  (row >= 2 && row <= 5 && column >= 2 && column <= 5) ||
  (row === 6 && column >= 2 && column <= 4) ||
  (column === 6 && row >= 2 && row <= 4);

/** The product's mark: a field of ten by ten dots, some filled. */
export function Mark({ className = "size-7" }: { className?: string }) {
  return (
    <svg viewBox={`0 0 ${SIDE * STEP} ${SIDE * STEP}`} className={className} aria-hidden="true">
      {Array.from({ length: SIDE * SIDE }, (_, i) => {
        const [row, column] = [Math.floor(i / SIDE), i % SIDE];
        return (
          <circle
            key={i}
            cx={STEP / 2 + column * STEP}
            cy={STEP / 2 + row * STEP}
            r={1.55}
            className={isFilled(row, column) ? "fill-higher" : "fill-lower/60"}
          />
        );
      })}
    </svg>
  );
}
