import { useRouteError } from "react-router-dom";
import { paths } from "#src/app/paths.ts";
import { ButtonLink } from "#src/ui/button.tsx";
import { Failed } from "#src/ui/states.tsx";

/** In place of a page that could not be shown. Most often its code could not be fetched: no network, or a new version. */
export function PageFault() {
  const error = useRouteError();
  return (
    <main className="mx-auto flex max-w-2xl flex-col gap-4 px-5 py-10">
      <Failed error={error} retry={() => window.location.reload()} />
      <p>
        <ButtonLink weight="quiet" to={paths.floor}>
          To the floor
        </ButtonLink>
      </p>
    </main>
  );
}
