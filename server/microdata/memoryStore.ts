import type { Design } from "../../shared/contracts/design.ts";
import type { SegmentSource, StoredRelease } from "./columnCache.ts";
import { assembleColumn } from "./columns.ts";
import type { CodebookVariable } from "./codebook.ts";
import { designVariables, layoutFor, readDesignData } from "./designData.ts";
import type { Layout } from "./layout.ts";
import type { Segment, SegmentSink } from "./segments.ts";

/** One release in memory instead of the database: what checks against reference results and the bench bring files into. */
export class MemoryStore implements SegmentSink, SegmentSource {
  readonly #segments = new Map<string, Segment[]>();
  #release: StoredRelease | null = null;
  #layout: Layout | null = null;

  put(variableId: string, number: number, segment: Segment): Promise<void> {
    const segments = this.#segments.get(variableId) ?? [];
    segments[number] = segment;
    this.#segments.set(variableId, segments);
    return Promise.resolve();
  }

  /** Declares the design of what was brought in. */
  declare(design: Design, variables: readonly CodebookVariable[], respondents: number): void {
    const byName = new Map(variables.map((variable) => [variable.name, variable]));
    const columns = new Map(
      designVariables(design, [...byName.keys()]).map((name) => {
        const variable = byName.get(name);
        if (!variable) throw new Error(`The design names “${name}”, which isn't there.`);
        return [name, { variable, column: assembleColumn(variable.storage, this.#segments.get(variable.id) ?? [], respondents) }];
      }),
    );
    this.#release = { respondents, design, variables };
    this.#layout = layoutFor(readDesignData(design, columns), respondents);
  }

  release(): Promise<StoredRelease> {
    if (!this.#release) throw new Error("No design was declared.");
    return Promise.resolve(this.#release);
  }

  segments(_releaseId: string, variableId: string): Promise<Segment[]> {
    return Promise.resolve(this.#segments.get(variableId) ?? []);
  }

  layout(): Promise<Layout> {
    if (!this.#layout) throw new Error("No design was declared.");
    return Promise.resolve(this.#layout);
  }
}
