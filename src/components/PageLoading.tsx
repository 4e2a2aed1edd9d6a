/** Stands where a page will be; says what is being fetched. */
export function PageLoading({ what }: { what: string }) {
  return (
    <div role="status" className="px-4 pt-10 text-muted sm:px-8">
      <span className="inline-block animate-pulse">Fetching {what}…</span>
    </div>
  );
}
