/**
 * Hashes, as a content security policy names them, of the style sheet that the toast library puts into the page by
 * itself: first empty, then filled. It has no other way to be let in. They belong to the pinned version: a test holds
 * them against the package.
 */
export const TOASTER_STYLE_HASHES = [
  'sha256-47DEQpj8HBSa+/TImW+5JCeuQeRkm5NMpJWZG3hSuFU=',
  'sha256-StEaX+se6YS7pqjzrzMIA0KaX9zF/8zAhvQXZAe5epY=',
] as const;
