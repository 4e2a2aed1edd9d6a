import {
  createColumnHelper,
  createSortedRowModel,
  rowSortingFeature,
  sortFn_alphanumeric,
  sortFn_basic,
  sortFn_datetime,
  sortFn_text,
  tableFeatures,
  type RowData,
} from "@tanstack/react-table";

/** What every table of the product can do. Kept at module level: a table starts afresh when its features change. */
export const features = tableFeatures({
  rowSortingFeature,
  sortedRowModel: createSortedRowModel(),
  sortFns: { alphanumeric: sortFn_alphanumeric, basic: sortFn_basic, datetime: sortFn_datetime, text: sortFn_text },
});
type Features = typeof features;

/** Column helper for rows of one type; call it at module level. */
export const columnsFor = <Row extends RowData>() => createColumnHelper<Features, Row>();

/** Columns of a table of such rows, made by the helper's `columns`. */
export type Columns<Row extends RowData> = ReturnType<ReturnType<typeof columnsFor<Row>>["columns"]>;
