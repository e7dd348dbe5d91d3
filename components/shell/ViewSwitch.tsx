'use client';

import { useId, useState } from 'react';
import { applyViewSetting, readViewSettings, type ViewSettings } from './view-settings';

const cookieJar = {
  get(name: string) {
    const value = document.cookie.split('; ').find((pair) => pair.startsWith(`${name}=`))?.slice(name.length + 1);
    return value === undefined ? undefined : { value };
  },
};

const themes = [
  ['system', 'As the device'],
  ['light', 'Light'],
  ['dark', 'Dark'],
] as const;

/** Light or dark, more contrast, single-key shortcuts. `initial` comes from the cookies on the server. */
export function ViewSwitch({ initial }: { initial?: ViewSettings }) {
  const name = useId();
  const [held, setHeld] = useState<ViewSettings>(() => initial ?? readViewSettings(typeof document === 'undefined' ? { get: () => undefined } : cookieJar));
  const set = <K extends keyof ViewSettings>(key: K, value: ViewSettings[K]) => {
    applyViewSetting(key, value);
    setHeld({ ...held, [key]: value });
  };
  return (
    <fieldset className="switch">
      <legend>Colours and keys</legend>
      {themes.map(([value, label]) => (
        <label className="check" key={value}>
          <input type="radio" className="dot" style={{ marginTop: 4 }} name={name} checked={held.theme === value} onChange={() => set('theme', value)} />
          <span>{label}</span>
        </label>
      ))}
      <label className="check">
        <input type="checkbox" className="tick" checked={held.contrast === 'more'} onChange={(event) => set('contrast', event.target.checked ? 'more' : 'normal')} />
        <span>More contrast</span>
      </label>
      <label className="check">
        <input type="checkbox" className="tick" checked={held.keys === 'on'} onChange={(event) => set('keys', event.target.checked ? 'on' : 'off')} />
        <span>Single-key shortcuts</span>
      </label>
    </fieldset>
  );
}
