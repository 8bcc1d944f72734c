/**
 * What a service returns: the value, or a code for an outcome that was to be expected (wrong input, no rights, gone).
 * Codes carry no sentence; `explain.ts` turns them into what happened, why, and what to try.
 */
export type Outcome<T, Code extends string = never, Detail extends object = object> =
  | Success<T>
  | Refusal<Code, Detail>;

export interface Success<T> {
  ok: true;
  value: T;
}

export type Refusal<Code extends string, Detail extends object = object> = { ok: false; code: Code } & Detail;

export function succeed<T>(value: T): Success<T> {
  return { ok: true, value };
}

export function refuse<Code extends string>(code: Code): Refusal<Code>;
export function refuse<Code extends string, Detail extends object>(
  code: Code,
  detail: Detail,
): Refusal<Code, Detail>;
export function refuse(code: string, detail: object = {}): Refusal<string> {
  return { ok: false, code, ...detail };
}
