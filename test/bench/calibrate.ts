/**
 * `npm run -s calibrate -- [REPLICATIONS] [FIRST_SEED]`: rank histograms of all parameters over many repetitions and their chi-square
 * statistics. Exit code 1 when one fails. Takes about a second a repetition.
 */
import { CALIBRATED, chiSquareOfRanks, rankTruth } from './calibration';

const BINS = 10;
/** chi2(9) at 1 - 0.01/12: one parameter in twelve fails by chance in one run of a hundred. Value from R 4.2.2: qchisq(1 - 0.01/12, 9). */
const LIMIT = 28.4;

function main(): void {
  const replications = Number(process.argv[2] ?? 200);
  const firstSeed = Number(process.argv[3] ?? 1);
  const rows: number[][] = [];
  let leftOut = 0;
  for (let seed = firstSeed; rows.length < replications; seed++) {
    const ranks = rankTruth(seed);
    if (ranks) rows.push(ranks);
    else leftOut++;
    if (rows.length % 20 === 0) process.stderr.write(`${rows.length} of ${replications}\r`);
  }
  console.log(
    `${replications} replications, ${leftOut} simulated series left out; chi-square limit ${LIMIT}`,
  );
  let isGood = true;
  CALIBRATED.forEach((id, j) => {
    const ranks = rows.map((row) => row[j]);
    const statistic = chiSquareOfRanks(ranks, BINS);
    isGood &&= statistic <= LIMIT;
    const histogram = Array.from(
      { length: BINS },
      (_, bin) => ranks.filter((rank) => Math.floor((rank * BINS) / 100) === bin).length,
    );
    console.log(`${id.padEnd(8)} ${statistic.toFixed(1).padStart(6)}  ${histogram.join(' ')}`);
  });
  process.exitCode = isGood ? 0 : 1;
}

main();
