/** Expected trouble is a value. `code` is for programs and tests; `says` tells a person what happened and what to do. */
export type Refusal<Code extends string = string> = { ok: false; code: Code; says: string; field?: string };
export type Success<Value> = { ok: true; value: Value };
export type Result<Value, Code extends string = string> = Success<Value> | Refusal<Code>;

export const done = <Value>(value: Value): Success<Value> => ({ ok: true, value });
export const refuse = <Code extends string>(code: Code, says: string, field?: string): Refusal<Code> =>
  field === undefined ? { ok: false, code, says } : { ok: false, code, says, field };

/** Missing and forbidden look alike. */
export const notFound = (): Refusal<'not-found'> => refuse('not-found', 'There is nothing here, or it is not yours to see.');
