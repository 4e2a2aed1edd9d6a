/** A file that must be refused, or reported upon, with the place where it is wrong. */
export interface BrokenFile {
  name: string;
  microdata: string | Uint8Array;
  codebook?: string | Uint8Array;
  kind: string;
  line: number | null;
  column?: string | null;
}

const utf8 = (text: string) => new TextEncoder().encode(text);
const bytes = (...parts: (string | number[])[]) =>
  Uint8Array.from(parts.flatMap((part) => (typeof part === "string" ? [...utf8(part)] : part)));

const CODEBOOK =
  "variable,label,kind,code,category label,missing\nw,Weight,numeric,,,\ns,Smokes,categorical,,,\ns,,,1,Yes,\ns,,,2,No,\n";
const SOUND = "w,s\n1.5,1\n2,2\n";
const withCodebook = (codebook: string) => ({ microdata: SOUND, codebook });

/** One of each kind of trouble that files have been seen to have. */
export const BROKEN_FILES: readonly BrokenFile[] = [
  { name: "an empty file", microdata: "", kind: "empty-file", line: null },
  { name: "only a byte order mark", microdata: "\uFEFF", kind: "empty-file", line: null },
  { name: "only a header", microdata: "w,s\n", codebook: CODEBOOK, kind: "no-rows", line: 1 },
  { name: "only blank lines after the header", microdata: "w,s\n\n\n", codebook: CODEBOOK, kind: "no-rows", line: 1 },
  { name: "no header", microdata: "1.5,1\n2,2\n", kind: "no-header", line: 1 },
  { name: "a blank header", microdata: ",\n1,2\n", kind: "no-header", line: 1 },
  { name: "a column without a name", microdata: "w,,s\n1,2,3\n", kind: "column-without-name", line: 1, column: "2" },
  { name: "two columns of the same name", microdata: "w,s,w\n1,2,3\n", kind: "duplicate-column", line: 1, column: "3" },
  {
    name: "a name of a hundred characters",
    microdata: `${"n".repeat(100)},s\n1,2\n`,
    kind: "column-name-too-long",
    line: 1,
    column: "1",
  },
  {
    name: "6,000 columns",
    microdata: `${Array.from({ length: 6000 }, (_, i) => `v${i}`).join(",")}\n`,
    kind: "too-many-columns",
    line: 1,
  },
  { name: "a row too short", microdata: "w,s\n1.5,1\n2\n", codebook: CODEBOOK, kind: "ragged-row", line: 3 },
  { name: "a row too long", microdata: "w,s\n1.5,1,7\n2,2\n", codebook: CODEBOOK, kind: "ragged-row", line: 2 },
  {
    name: "a file that ends in the middle of a row",
    microdata: "w,s\n1.5,1\n2",
    codebook: CODEBOOK,
    kind: "ragged-row",
    line: 3,
  },
  {
    name: "another delimiter from some line on",
    microdata: "w,s\n1.5,1\n2;2\n",
    codebook: CODEBOOK,
    kind: "ragged-row",
    line: 3,
  },
  { name: "Windows-1252", microdata: bytes("w,s\n1,caf", [0xe9], "\n"), kind: "not-utf8", line: 2 },
  { name: "UTF-16", microdata: bytes([0xff, 0xfe, 0x77, 0x00, 0x2c, 0x00, 0x73, 0x00]), kind: "not-csv", line: 1 },
  { name: "half a UTF-8 character at the end", microdata: bytes("w,s\n1,2\n1,caf", [0xc3]), kind: "not-utf8", line: 3 },
  { name: "a zip called .csv", microdata: bytes([0x50, 0x4b, 0x03, 0x04, 0x14, 0, 0, 0, 8, 0]), kind: "not-csv", line: 1 },
  { name: "gzip called .csv", microdata: bytes([0x1f, 0x8b, 8, 0, 0, 0, 0, 0]), kind: "not-csv", line: 1 },
  { name: "a PDF called .csv", microdata: "%PDF-1.7\n%âãÏÓ\n", kind: "not-csv", line: 1 },
  {
    name: "an old spreadsheet called .csv",
    microdata: bytes([0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1]),
    kind: "not-csv",
    line: 1,
  },
  { name: "NUL bytes", microdata: bytes("w,s\n1.5,1\n2", [0, 0], ",2\n"), kind: "nul-byte", line: 3 },
  { name: "a quote never closed", microdata: 'w,s\n1.5,1\n2,"2\n3,1\n', codebook: CODEBOOK, kind: "unclosed-quote", line: 3 },
  { name: "a quote inside a plain field", microdata: 'w,s\n1.5,1\n2,5" pipe\n', kind: "stray-quote", line: 3 },
  { name: "text after a closing quote", microdata: 'w,s\n"1.5"x,1\n', kind: "stray-quote", line: 2 },
  { name: "a cell of ten megabytes in quotes", microdata: `w,s\n1,"${"x".repeat(10 << 20)}"\n`, kind: "unclosed-quote", line: 2 },
  { name: "a cell of ten megabytes", microdata: `w,s\n1,${"x".repeat(10 << 20)}\n`, kind: "line-too-long", line: 2 },
  {
    name: "a cell of two megabytes",
    microdata: `w,s\n1,2\n1,${"x".repeat(2 << 20)}\n`,
    kind: "cell-too-long",
    line: 3,
    column: "s",
  },
  {
    name: "letters in a weight",
    microdata: "w,s\n1.5,1\ntwo,2\n",
    codebook: CODEBOOK,
    kind: "not-a-number",
    line: 3,
    column: "w",
  },
  {
    name: "a number past what a computer holds",
    microdata: "w,s\n1e999,1\n",
    codebook: CODEBOOK,
    kind: "not-a-number",
    line: 2,
    column: "w",
  },
  {
    name: "a decimal comma in a file with commas",
    microdata: 'w,s\n"1,5",1\n',
    codebook: CODEBOOK,
    kind: "not-a-number",
    line: 2,
    column: "w",
  },
  { name: "a hexadecimal number", microdata: "w,s\n0x1F,1\n", codebook: CODEBOOK, kind: "not-a-number", line: 2, column: "w" },
  {
    name: "a code that isn't in the codebook",
    microdata: "w,s\n1.5,1\n2,7\n",
    codebook: CODEBOOK,
    kind: "unknown-code",
    line: 3,
    column: "s",
  },
  {
    name: "a codebook for other variables",
    ...withCodebook("variable,kind\nage,numeric\nsex,text\n"),
    kind: "other-codebook",
    line: null,
    column: "age",
  },
  {
    name: "a codebook with one variable too many",
    ...withCodebook(`${CODEBOOK}age,Age,numeric,,,\n`),
    kind: "variable-not-in-data",
    line: null,
    column: "age",
  },
  { name: "a codebook without its columns", ...withCodebook("name,type\nw,numeric\n"), kind: "codebook-header", line: 1 },
  {
    name: "a codebook with an unknown kind",
    ...withCodebook(CODEBOOK.replace("numeric", "decimal")),
    kind: "codebook-kind",
    line: 2,
    column: "kind",
  },
  {
    name: "a codebook that describes a variable twice",
    ...withCodebook(`${CODEBOOK}w,Again,numeric,,,\n`),
    kind: "codebook-duplicate",
    line: 6,
    column: "variable",
  },
  {
    name: "a codebook with a code twice",
    ...withCodebook(`${CODEBOOK}s,,,2,Nein,\n`),
    kind: "codebook-code-twice",
    line: 6,
    column: "s",
  },
  {
    name: "a codebook with a category before its variable",
    ...withCodebook(`variable,kind,code\ns,,1\n`),
    kind: "codebook-order",
    line: 2,
    column: "variable",
  },
  {
    name: "a codebook that says maybe",
    ...withCodebook(`${CODEBOOK}s,,,9,Refused,maybe\n`),
    kind: "codebook-missing",
    line: 6,
    column: "s",
  },
  { name: "a codebook of only a header", ...withCodebook("variable,kind\n"), kind: "codebook-empty", line: null },
  { name: "a zip as codebook", microdata: SOUND, codebook: bytes([0x50, 0x4b, 0x03, 0x04]), kind: "not-csv", line: 1 },
];
