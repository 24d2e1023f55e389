import type { FieldError } from '../errors.ts';

/** What a schema says of one offending place; the part of zod's issue that is read here. */
export interface SchemaIssue {
  readonly code: string;
  readonly message: string;
  readonly path: readonly PropertyKey[];
  readonly keys?: readonly string[];
  readonly errors?: readonly (readonly SchemaIssue[])[];
}

/** RFC 6901 pointer of a path of keys and indices. */
export const pointerOf = (path: readonly PropertyKey[]): string =>
  path.map((key) => `/${String(key).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');

/** zod's issues as errors that name the field: unknown keys one by one, unions by the form that the body was closest to. */
export function fieldErrors(issues: readonly SchemaIssue[], body: unknown): FieldError[] {
  return issues
    .flatMap((issue) => flatten(issue, [], body))
    .map(({ path, detail }) => ({ pointer: pointerOf(path), detail }));
}

interface Found {
  readonly path: readonly PropertyKey[];
  readonly detail: string;
}

function flatten(issue: SchemaIssue, base: readonly PropertyKey[], body: unknown): Found[] {
  const path = [...base, ...issue.path];
  if (issue.code === 'unrecognized_keys' && issue.keys) {
    return issue.keys.map((key) => ({ path: [...path, key], detail: 'unknown field' }));
  }
  if (issue.code === 'invalid_union' && issue.errors && issue.errors.length > 0) {
    const form = closestForm(issue.errors);
    if (form) return form.flatMap((inner) => flatten(inner, path, body));
    return [{ path, detail: 'fits none of the forms that are accepted here' }];
  }
  const missing = issue.code === 'invalid_type' && valueAt(body, path) === undefined;
  return [{ path, detail: missing ? `missing: ${issue.message}` : issue.message }];
}

/**
 * Of the forms of a union, the one whose own keys the body used: a form that the body shares no key with complains of unknown and
 * missing keys at its top. Undefined where that does not tell them apart.
 */
function closestForm(forms: readonly (readonly SchemaIssue[])[]): readonly SchemaIssue[] | undefined {
  const distance = (issues: readonly SchemaIssue[]) =>
    issues.reduce((sum, issue) => {
      if (issue.code === 'unrecognized_keys') return sum + 4 * (issue.keys?.length ?? 1);
      return sum + (issue.path.length <= 1 ? 2 : 1);
    }, 0);
  const ranked = forms
    .map((issues) => ({ issues, distance: distance(issues) }))
    .sort((a, b) => a.distance - b.distance);
  const [best, next] = ranked;
  if (!best || (next && next.distance === best.distance)) return undefined;
  return best.issues;
}

function valueAt(body: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>((value, key) => (value as Record<PropertyKey, unknown> | null | undefined)?.[key], body);
}

/** The first few errors in one line. */
export const summarise = (fields: readonly FieldError[]): string =>
  fields
    .slice(0, 3)
    .map(({ pointer, detail }) => `${pointer || 'the body'}: ${detail}`)
    .join('; ') + (fields.length > 3 ? `; and ${fields.length - 3} more` : '');
