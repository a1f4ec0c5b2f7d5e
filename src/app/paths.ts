/** Where the pages are. */
export const paths = {
  floor: "/",
  signIn: "/sign-in",
  toolpath: (id: string, readingId?: string) => `/toolpaths/${id}${readingId ? `?reading=${readingId}` : ""}`,
  tune: (readingId: string) => `/readings/${readingId}/tune`,
  comparePlans: (readingId: string, first: { id: string; version: number }) =>
    `/readings/${readingId}/compare?a=${first.id}&av=${first.version}`,
  tuning: (id: string, layer?: number) => `/tunings/${id}${layer ? `?layer=${layer}` : ""}`,
  members: "/members",
  documents: (plural: string) => `/${plural}`,
  document: (plural: string, id: string, version?: number) => `/${plural}/${id}${version ? `?version=${version}` : ""}`,
  editDocument: (plural: string, id: string) => `/${plural}/${id}/edit`,
  newDocument: (plural: string) => `/${plural}/new`,
  compare: (plural: string, id: string, from: number, to: number) => `/${plural}/${id}/compare?from=${from}&to=${to}`,
};
