import type { Layout } from "./layout.ts";

/** A layout's arrays by name, as bytes to be kept. */
export type LayoutParts = Record<string, Uint8Array>;

const WHOLE = ["order", "psuStart", "stratumStart", "unitStart", "psuUnitStart"] as const;
const REAL = ["stratumPopulation", "psuPopulation"] as const;

const bytesOf = (array: Uint32Array | Float64Array) => new Uint8Array(array.buffer, array.byteOffset, array.byteLength);

/** Little-endian bytes of each array that a layout has. */
export function layoutParts(layout: Layout): LayoutParts {
  const parts: LayoutParts = {};
  for (const name of [...WHOLE, ...REAL]) {
    const array = layout[name];
    if (array) parts[name] = bytesOf(array);
  }
  return parts;
}

/** A layout from its parts, over shared memory. @throws {Error} when a part that every layout has is missing. */
export function layoutOf(parts: LayoutParts): Layout {
  const shared = (name: string) => {
    const bytes = parts[name];
    if (!bytes) return null;
    const buffer = new SharedArrayBuffer(bytes.byteLength);
    new Uint8Array(buffer).set(bytes);
    return buffer;
  };
  const whole = (name: (typeof WHOLE)[number]) => {
    const buffer = shared(name);
    return buffer ? new Uint32Array(buffer) : null;
  };
  const real = (name: (typeof REAL)[number]) => {
    const buffer = shared(name);
    return buffer ? new Float64Array(buffer) : null;
  };
  const [order, psuStart, stratumStart] = [whole("order"), whole("psuStart"), whole("stratumStart")];
  if (!order || !psuStart || !stratumStart) throw new Error("A release's layout is incomplete.");
  return {
    order,
    psuStart,
    stratumStart,
    stratumPopulation: real("stratumPopulation"),
    unitStart: whole("unitStart"),
    psuUnitStart: whole("psuUnitStart"),
    psuPopulation: real("psuPopulation"),
  };
}
