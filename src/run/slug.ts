const LONGEST = 60;

/**
 * A title as the name of a folder or file: lower-case ASCII letters, digits and single hyphens, at most 60 characters, so
 * that no title can lead out of its folder. What has no such letters becomes `untitled`.
 */
export function slug(title: string): string {
  const plain = title
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .slice(0, LONGEST)
    .replace(/^-+|-+$/g, '');
  return plain || 'untitled';
}
