import { Layout as LayoutRow } from "../models/Column.ts";
import { Release } from "../models/Release.ts";
import { loadCodebook } from "../services/codebook.ts";
import type { SegmentSource, StoredRelease } from "./columnCache.ts";
import { layoutOf } from "./layoutParts.ts";
import type { Layout } from "./layout.ts";
import { readSegments } from "./segmentRows.ts";
import { sha256, type Segment } from "./segments.ts";

/** Segments and layouts as MariaDB keeps them; the models must be connected. */
export class DatabaseStore implements SegmentSource {
  async release(releaseId: string): Promise<StoredRelease> {
    const release = await Release.findByPk(releaseId);
    if (!release?.design) throw new Error("The release has no design.");
    return { respondents: release.respondents, design: release.design, variables: await loadCodebook(release) };
  }

  segments(_releaseId: string, variableId: string): Promise<Segment[]> {
    return readSegments(variableId);
  }

  async layout(releaseId: string): Promise<Layout> {
    const rows = await LayoutRow.findAll({ where: { releaseId }, raw: true });
    const damaged = rows.find(({ bytes, checksum }) => sha256(bytes) !== checksum);
    if (damaged) throw new Error("A release's layout isn't what was stored: its checksum differs. Declare the design again.");
    return layoutOf(Object.fromEntries(rows.map(({ part, bytes }) => [part, bytes])));
  }
}
