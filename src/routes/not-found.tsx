import { paths } from "#src/app/paths.ts";
import { usePageTitle } from "#src/lib/use-page-title.ts";
import { ButtonLink } from "#src/ui/button.tsx";
import { PageHead } from "#src/ui/section.tsx";

export function NotFound() {
  usePageTitle("No such page");
  return (
    <>
      <PageHead title="There is no such page" note="The address may be mistyped, or what it named was removed." />
      <ButtonLink to={paths.floor}>To the floor</ButtonLink>
    </>
  );
}
