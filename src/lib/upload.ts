import { noAnswer, problemFrom } from "#src/lib/problem.ts";
import { waitForSignIn } from "#src/lib/sign-in-gate.ts";

export interface Upload {
  url: string;
  file: File;
  signal: AbortSignal;
  onBytes(sent: number, ofBytes: number): void;
}

/**
 * Sends a file as the field `file` of a form. Not fetch: that tells nothing of how far a body has come.
 *
 * @throws ProblemError, or an AbortError when given up
 */
export async function upload<Reply>(task: Upload): Promise<Reply> {
  let { status, text } = await send(task);
  if (status === 401 && (await waitForSignIn())) ({ status, text } = await send(task));
  if (status < 200 || status > 299) throw problemFrom(status, text);
  return JSON.parse(text) as Reply;
}

function send({ url, file, signal, onBytes }: Upload): Promise<{ status: number; text: string }> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    const form = new FormData();
    form.append("file", file, file.name);
    request.open("POST", url);
    request.setRequestHeader("accept", "application/json");
    request.upload.onprogress = ({ loaded, total }) =>
      onBytes(Math.min(loaded, file.size), total > 0 ? file.size : loaded);
    request.onload = () => resolve({ status: request.status, text: request.responseText });
    request.onerror = () => reject(noAnswer());
    request.onabort = () => reject(new DOMException("The upload was given up.", "AbortError"));
    signal.addEventListener("abort", () => request.abort(), { once: true });
    if (signal.aborted) request.abort();
    else request.send(form);
  });
}
