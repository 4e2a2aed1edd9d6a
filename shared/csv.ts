/** What a spreadsheet may take for the start of a formula (OWASP ASVS 5.0.0, 1.2.10; CR from OWASP's page on CSV injection). */
const FORMULA_START = /^[=+\-@\t\r\0]/;

/** Text that is safe as a CSV cell: a leading quote keeps spreadsheets from running it. Numbers must stay numbers; don't pass them here. */
export function guardTextCell(text: string): string {
  return FORMULA_START.test(text) ? `'${text}` : text;
}
