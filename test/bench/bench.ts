/** `npm run bench -- accuracy|speed|recognition [options]`; without a word: speed, then accuracy. */
const word = process.argv[2];
if (word === 'recognition') await import('./recognition.bench.ts');
else {
  if (word !== 'accuracy') await import('./speed.bench.ts');
  if (word !== 'speed') await import('./accuracy.bench.ts');
}
