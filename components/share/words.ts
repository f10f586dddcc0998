/** `looked at 3 times` */
export const lookedWords = (times: number): string => (times === 0 ? 'not looked at yet' : `looked at ${times} ${times === 1 ? 'time' : 'times'}`);
