const WITH_FREE_WORDS = /^((?:write|change|remove) (?:event|symptom) [\d:.]+) .*$/;

/** The name of an edit as it may be shown: what people wrote in it, which may name a person, goes where identity is hidden. */
export const editNameShown = (name: string, identityHidden: boolean): string =>
  identityHidden ? name.replace(WITH_FREE_WORDS, '$1') : name;
