/** Keeps a number and what follows it on one line: "68 %", "7 in 10", "12 min". For running text that may wrap. */
export const glue = (text: string): string =>
  text.replace(/(\d) (%|min)/g, '$1\u00a0$2').replace(/(\d+) in (\d+)/g, '$1\u00a0in\u00a0$2');
