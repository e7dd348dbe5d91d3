/** Conventions that questions state often, in words; another text stands as it is written, so edition tags fit too. */
const known: Record<string, string> = {
  'conventional-current': 'Current is conventional: it flows from plus to minus outside the source.',
  'electron-flow': 'Current is electron flow: from minus to plus outside the source.',
  'viewed-from-drive-end': 'Rotation is seen from the drive end.',
  'viewed-opposite-drive-end': 'Rotation is seen from the end opposite the drive.',
  'regulation-on-full-load-speed': 'Speed regulation is taken on the full-load speed.',
  'regulation-on-full-load-voltage': 'Voltage regulation is taken on the full-load voltage.',
  'brush-drop-neglected': 'Brush drop is neglected.',
  'armature-reaction-neglected': 'Armature reaction is neglected.',
};

/** A convention as it is printed with the question. */
export const conventionText = (convention: string): string => (Object.hasOwn(known, convention) ? (known[convention] ?? convention) : convention);
