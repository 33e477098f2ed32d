import { useEffect, useState } from 'react';
import { watchPhotographs } from './send-photograph';

/** Sends on the photographs of swaps that still wait on this device, also when their event is long over. */
export const WaitingPhotograph = () => {
  const [words, setWords] = useState<string>();
  useEffect(() => watchPhotographs(setWords), []);
  return words === undefined ? null : <p role="status">{words}</p>;
};
