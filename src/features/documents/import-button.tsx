import { useMutation, useQueryClient } from "@tanstack/react-query";
import { useRef } from "react";
import { parseJson } from "#shared/formats/parse-json.ts";
import type { DocumentKind, Version } from "#src/features/documents/kinds.ts";
import { asProblem } from "#src/lib/problem.ts";
import { Button } from "#src/ui/button.tsx";
import { Actions, Dialog } from "#src/ui/dialog.tsx";
import { ProblemNotice } from "#src/ui/notice.tsx";

interface Props<D extends { name: string }> {
  kind: DocumentKind<D>;
  onImported(version: Version<D>): void;
}

/** Takes a document from a JSON file, as a page saves it or as the command line uses it. */
export function ImportButton<D extends { name: string }>({ kind, onImported }: Props<D>) {
  const client = useQueryClient();
  const input = useRef<HTMLInputElement>(null);
  const take = useMutation({
    mutationFn: async (file: File) =>
      kind.create(kind.parse(parseJson(await file.text(), file.name)), `Brought in from ${file.name}`),
    onSuccess: (version) => {
      client.invalidateQueries({ queryKey: [kind.plural] });
      onImported(version);
    },
  });
  return (
    <>
      <Button disabled={take.isPending} onClick={() => input.current?.click()}>
        Bring in a document (JSON)
      </Button>
      <input
        ref={input}
        type="file"
        accept=".json,application/json"
        className="hidden"
        aria-label={`JSON file of a ${kind.noun}`}
        onChange={({ target }) => {
          const file = target.files?.[0];
          if (file) take.mutate(file);
          target.value = "";
        }}
      />
      {take.error && (
        <Dialog title="Not brought in" onClose={() => take.reset()}>
          <ProblemNotice problem={asProblem(take.error)} />
          <Actions>
            <Button onClick={() => take.reset()}>Put away</Button>
          </Actions>
        </Dialog>
      )}
    </>
  );
}
