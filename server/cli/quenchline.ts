export async function main(argv: string[]): Promise<number> {
  process.stdout.write(`hi ${argv}\n`);
  return 0;
}
