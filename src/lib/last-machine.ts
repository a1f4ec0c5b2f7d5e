/** A tablet on the shop floor is used by several people, so what each of them chose is kept apart. */
const key = (userId: string): string => `quenchline.machine.${userId}`;

/** The machine a person brought a toolpath in for last, if the team still has it; the only one where there is one. */
export function lastMachine(userId: string, machines: readonly { id: string }[]): string | undefined {
  if (machines.length === 1) return machines[0].id;
  let kept: string | null = null;
  try {
    kept = localStorage.getItem(key(userId));
  } catch {
    // Storage may be closed to us.
  }
  return machines.find(({ id }) => id === kept)?.id;
}

export function rememberMachine(userId: string, machineId: string): void {
  try {
    localStorage.setItem(key(userId), machineId);
  } catch {
    // As above: the choice lasts as long as the page.
  }
}
