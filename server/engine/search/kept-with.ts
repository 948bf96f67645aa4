/**
 * Makes a function that works something out once for an object and keeps it as long as the object
 * lives. `context` must follow from the object: only the first call's counts.
 */
export function keptWith<Key extends object, Value, Context = void>(
  work: (key: Key, context: Context) => Value,
): (key: Key, context: Context) => Value {
  const known = new WeakMap<Key, { value: Value }>();
  return (key, context) => {
    let kept = known.get(key);
    if (!kept) {
      kept = { value: work(key, context) };
      known.set(key, kept);
    }
    return kept.value;
  };
}

/** As `keptWith`, one value for each object and each `name`. */
export function keptByName<Key extends object, Name extends string | number, Value, Context = void>(
  work: (key: Key, name: Name, context: Context) => Value,
): (key: Key, name: Name, context: Context) => Value {
  const shelfOf = keptWith((_: Key) => new Map<Name, { value: Value }>());
  return (key, name, context) => {
    const shelf = shelfOf(key);
    let kept = shelf.get(name);
    if (!kept) {
      kept = { value: work(key, name, context) };
      shelf.set(name, kept);
    }
    return kept.value;
  };
}
