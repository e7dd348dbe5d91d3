export type ButtonLook = 'main' | 'plain' | 'quiet' | 'stop' | 'stop-main';
export type ButtonSize = 'dense' | 'control' | 'touch' | 'exam';

const sizes: Record<ButtonSize, string> = { dense: ' btn--sm', control: '', touch: ' btn--touch', exam: ' btn--lg' };

/** One primary action (`main`) a page; `stop` for what ends something, `stop-main` where that is confirmed. */
export function buttonClass(look: ButtonLook = 'plain', size: ButtonSize = 'control', more = ''): string {
  return `btn${look === 'plain' ? '' : ` btn--${look}`}${sizes[size]}${more ? ` ${more}` : ''}`;
}
