/** Names what an effect is to follow though it does not use the values: reading them is all it takes. */
export function dependsOn(..._values: readonly unknown[]): void {
  // Nothing to do.
}
