import type { Design } from "../../shared/contracts/design.ts";
import type { Sample } from "../statistics/types.ts";
import { asNumbers, assembleColumn, permuteColumn, type LoadedColumn } from "./columns.ts";
import type { CodebookVariable } from "./codebook.ts";
import type { Layout } from "./layout.ts";
import { expandPattern, replicateScale, replicateScales } from "./replicates.ts";
import type { Segment } from "./segments.ts";

/** A release's microdata as they are kept. */
export interface StoredRelease {
  respondents: number;
  design: Design;
  variables: readonly CodebookVariable[];
}

/** Where segments and layouts come from. */
export interface SegmentSource {
  release(releaseId: string): Promise<StoredRelease>;
  segments(releaseId: string, variableId: string): Promise<Segment[]>;
  /** @throws {Error} where no design was declared. */
  layout(releaseId: string): Promise<Layout>;
}

interface Kept {
  bytes: number;
  value: Promise<unknown>;
}

/** Every array of a sample, to count its bytes. */
const sampleBytes = (sample: Sample): number =>
  sample.weight.byteLength +
  sample.psuStart.byteLength +
  sample.stratumStart.byteLength +
  (sample.secondStage?.unitStart.byteLength ?? 0) +
  (sample.replicates?.weights.reduce((sum, { byteLength }) => sum + byteLength, 0) ?? 0);

/**
 * Columns and samples of releases over shared memory, rows in layout order. The least recently used go when the budget
 * is passed; whoever asks for the same at the same time shares one load.
 */
export class ColumnCache {
  readonly #source: SegmentSource;
  readonly #budgetBytes: number;
  readonly #kept = new Map<string, Kept>();
  #bytes = 0;

  constructor(source: SegmentSource, budgetBytes: number) {
    this.#source = source;
    this.#budgetBytes = budgetBytes;
  }

  /** One variable's values. */
  column(releaseId: string, variableId: string): Promise<LoadedColumn> {
    return this.#get(
      `${releaseId} column ${variableId}`,
      () => this.#load(releaseId, variableId),
      ({ values }) => values.byteLength,
    );
  }

  /** Weights and design of a release, for the engine. */
  sample(releaseId: string): Promise<Sample> {
    return this.#get(`${releaseId} sample`, () => this.#loadSample(releaseId), sampleBytes);
  }

  /** Lets go of a release whose codebook or design changed. */
  forget(releaseId: string): void {
    for (const [key, { bytes }] of this.#kept) {
      if (!key.startsWith(`${releaseId} `)) continue;
      this.#kept.delete(key);
      this.#bytes -= bytes;
    }
  }

  #get<Value>(key: string, load: () => Promise<Value>, bytesOf: (value: Value) => number): Promise<Value> {
    const known = this.#kept.get(key);
    if (known) {
      this.#kept.delete(key);
      this.#kept.set(key, known);
      // One key is only ever filled by one kind of load.
      return known.value as Promise<Value>;
    }
    const entry: Kept = { bytes: 0, value: Promise.resolve() };
    const value = load().then(
      (loaded) => {
        if (this.#kept.get(key) === entry) {
          entry.bytes = bytesOf(loaded);
          this.#bytes += entry.bytes;
          this.#evict(key);
        }
        return loaded;
      },
      (error: unknown) => {
        if (this.#kept.get(key) === entry) this.#kept.delete(key);
        throw error;
      },
    );
    entry.value = value;
    this.#kept.set(key, entry);
    return value;
  }

  #evict(newest: string): void {
    for (const [key, { bytes }] of this.#kept) {
      if (this.#bytes <= this.#budgetBytes) return;
      if (key === newest || bytes === 0) continue;
      this.#kept.delete(key);
      this.#bytes -= bytes;
    }
  }

  #layout(releaseId: string): Promise<Layout> {
    return this.#get(
      `${releaseId} layout`,
      () => this.#source.layout(releaseId),
      ({ order, psuStart }) => order.byteLength + psuStart.byteLength,
    );
  }

  async #load(releaseId: string, variableId: string): Promise<LoadedColumn> {
    const [release, segments, layout] = await Promise.all([
      this.#source.release(releaseId),
      this.#source.segments(releaseId, variableId),
      this.#layout(releaseId),
    ]);
    const variable = release.variables.find(({ id }) => id === variableId);
    if (!variable) throw new Error("The release has no such variable.");
    return permuteColumn(assembleColumn(variable.storage, segments, release.respondents), layout.order);
  }

  async #loadSample(releaseId: string): Promise<Sample> {
    const { design, variables, respondents } = await this.#source.release(releaseId);
    const layout = await this.#layout(releaseId);
    const byName = new Map(variables.map((variable) => [variable.name, variable]));
    const numbers = async (name: string) => {
      const variable = byName.get(name);
      if (!variable) throw new Error(`The release has no variable “${name}”.`);
      return asNumbers(await this.#load(releaseId, variable.id), variable);
    };
    const weight =
      design.weight === null ? new Float64Array(new SharedArrayBuffer(8 * respondents)).fill(1) : await numbers(design.weight);
    const sample: Sample = {
      weight,
      psuStart: layout.psuStart,
      stratumStart: layout.stratumStart,
      lonely: design.lonely,
      stratumPopulation: layout.stratumPopulation,
      secondStage:
        layout.unitStart && layout.psuUnitStart && layout.psuPopulation
          ? { unitStart: layout.unitStart, psuUnitStart: layout.psuUnitStart, psuPopulation: layout.psuPopulation }
          : null,
      replicates: null,
    };
    if (design.replicates === null) return sample;
    const declared = design.replicates;
    const names = expandPattern(declared.pattern, [...byName.keys()]) ?? [];
    const weights: Float64Array[] = [];
    for (const name of names) weights.push(await numbers(name));
    return {
      ...sample,
      replicates: {
        weights,
        scale: replicateScale(declared, names.length),
        replicateScales: replicateScales(declared, names.length),
        mse: declared.mse,
        degreesOfFreedom: declared.degreesOfFreedom ?? names.length - 1,
      },
    };
  }
}
