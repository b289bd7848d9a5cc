declare const brand: unique symbol;

/** A number or array that carries its unit or frame in its type, where a mix-up would be silent. */
export type Branded<Value, Name extends string> = Value & { readonly [brand]?: Name };
