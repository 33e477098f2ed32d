import { useEffect, useState } from 'react';
import { focusField } from './faults';

/** Puts the eye on the field at a pointer, once what was opened for it is on the page. */
export const useGoTo = (): ((pointer: string) => void) => {
  const [goTo, setGoTo] = useState<string>();
  useEffect(() => {
    if (goTo === undefined) return;
    focusField(goTo);
    setGoTo(undefined);
  }, [goTo]);
  return setGoTo;
};
