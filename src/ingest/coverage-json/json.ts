// Cautious steps into JSON of unknown shape.

export type JsonObject = Readonly<Record<string, unknown>>;

/** The value as an object; an empty one where it is none. */
export function objectIn(value: unknown): JsonObject {
  return typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as JsonObject) : {};
}

/** The value as a list; an empty one where it is none. */
export function listIn(value: unknown): readonly unknown[] {
  return Array.isArray(value) ? value : [];
}

/** The value as text; empty where it is none. */
export function textIn(value: unknown): string {
  return typeof value === 'string' ? value : '';
}

/** A text in any language of an internationalised string, English first (OGC 21-069r2, section 5.2). */
export function labelIn(value: unknown): string {
  const texts = objectIn(value);
  return textIn(texts.en) || textIn(Object.values(texts)[0]) || textIn(value);
}
