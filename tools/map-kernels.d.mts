export function mapModule(
  bytes: Uint8Array,
  names: readonly string[],
  options?: { inline?: boolean },
): Uint8Array<ArrayBuffer>;
