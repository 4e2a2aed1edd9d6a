import type { ImportView } from "../../../shared/contracts/imports.ts";
import { formatCounted } from "../../../shared/format.ts";

type Problem = ImportView["problems"][number];

const FILES = { microdata: "Microdata", codebook: "Codebook" } as const;

function placeWords({ line, column, value }: Problem["first"][number]): string {
  const where = [line === null ? "" : `line ${line}`, column === null ? "" : `column ${column}`]
    .filter((part) => part !== "")
    .join(", ");
  return value === null ? where : `${where}${where === "" ? "" : ": "}“${value}”`;
}

/** Every kind of trouble with how often it occurs and where first. */
export function ProblemReport({ problems }: { problems: readonly Problem[] }) {
  if (problems.length === 0) return null;
  return (
    <ul className="mt-3 space-y-3">
      {problems.map((problem) => (
        <li key={`${problem.file} ${problem.kind}`}>
          <p>
            <span className="font-medium">
              {FILES[problem.file]}, {formatCounted(problem.count, "place")}:
            </span>{" "}
            {problem.message}
          </p>
          {problem.first.length > 0 && (
            <ul className="mt-1 text-sm text-muted">
              {problem.first.map((place, i) => (
                <li key={i}>{placeWords(place)}</li>
              ))}
              {problem.count > problem.first.length && <li>and {problem.count - problem.first.length} more</li>}
            </ul>
          )}
        </li>
      ))}
    </ul>
  );
}
