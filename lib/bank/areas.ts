import type { Library } from '@/lib/templates/library';
import { loadLibrary } from './library';

let kept: Library | undefined;
// Read once a process: the library is part of the program.
const library = (): Library => (kept ??= loadLibrary());

/** The areas of the library, in their order. */
export const areaList = (): { name: string; title: string }[] => Object.values(library().areas).map(({ area, title }) => ({ name: area, title }));
/** Titles of the areas by their name. */
export const areaTitles = (): Record<string, string> => Object.fromEntries(areaList().map(({ name, title }) => [name, title]));
/** The cautions of the library, in their order. */
export const cautionList = (): { name: string; title: string }[] => Object.values(library().cautions).map(({ caution, title }) => ({ name: caution, title }));
