import {
  createColumnHelper,
  createSortedRowModel,
  rowSortingFeature,
  sortFns,
  tableFeatures,
  type RowData,
} from "@tanstack/react-table";

/** What every table of the product can do. Kept at module level: a table starts afresh when its features change. */
export const features = tableFeatures({ rowSortingFeature, sortedRowModel: createSortedRowModel(), sortFns });
export type Features = typeof features;

/** Column helper for rows of one type; call it at module level. */
export const columnsFor = <Row extends RowData>() => createColumnHelper<Features, Row>();
