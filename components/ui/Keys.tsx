import { Fragment } from 'react';

/** One key or chord as it is pressed: "Ctrl K". */
export function Key({ children }: { children: string }) {
  return <kbd className="kbd">{children}</kbd>;
}

/** What can be done from the keyboard here. */
export function Keys({ keys }: { keys: readonly { press: readonly string[]; does: string }[] }) {
  return (
    <dl className="keys">
      {keys.map((one) => (
        <Fragment key={one.does}>
          <dt>
            {one.press.map((key) => (
              <Key key={key}>{key}</Key>
            ))}
          </dt>
          <dd>{one.does}</dd>
        </Fragment>
      ))}
    </dl>
  );
}
