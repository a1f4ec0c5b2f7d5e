import { profileGist } from "#server/documents/gists.ts";
import { Documents } from "#server/documents/service.ts";
import { contentOf } from "#shared/formats/document.ts";
import { type Profile, parseProfile, writeProfile } from "#shared/formats/profile.ts";

export const profiles = new Documents<Profile>({
  kind: "profile",
  nameOf: ({ name }) => name,
  parse: parseProfile,
  write: (profile) => writeProfile(contentOf(profile)),
  gist: (profile) => ({ profile: profileGist(profile) }),
});
