#!/usr/bin/env node
/**
 * Checks issued files without any server. Needs nothing but Node 18 or later.
 *
 *   node verify.mjs MANIFEST.json MANIFEST.sig KEY.pem FILE…
 *
 * Says of the manifest whether it is signed by the key, and of each file whether the manifest names its digest. Ends with 0 where
 * everything is right, 1 where something is wrong, 2 where it could not be checked.
 *
 * Whether the key is the network's own is told by where you have it from: compare its fingerprint, which is printed, with the
 * one that the network publishes and that stands in the files.
 */
import { createHash, createPublicKey, verify } from 'node:crypto';
import { createReadStream, readFileSync } from 'node:fs';
import { basename } from 'node:path';
import { pipeline } from 'node:stream/promises';

const [manifestPath, signaturePath, keyPath, ...files] = process.argv.slice(2);
let isWrong = false;

function say(isRight, words) {
  if (!isRight) isWrong = true;
  console.log(`${isRight ? 'right' : 'WRONG'}  ${words}`);
}

async function digestOf(path) {
  const hash = createHash('sha256');
  await pipeline(createReadStream(path), hash);
  return hash.digest('hex');
}

/** The key's fingerprint and whether it signed the manifest. */
function checkSignature(text) {
  const key = createPublicKey(readFileSync(keyPath));
  const fingerprint = createHash('sha256')
    .update(key.export({ type: 'spki', format: 'der' }))
    .digest('hex');
  const isEd25519 = key.asymmetricKeyType === 'ed25519';
  const isSigned = isEd25519 && verify(null, text, key, readFileSync(signaturePath));
  say(isSigned, `the manifest is ${isSigned ? '' : 'NOT '}signed by key ${fingerprint}`);
  return fingerprint;
}

function digestOfLines(lines) {
  return createHash('sha256')
    .update(lines.map((line) => `${line}\n`).join(''))
    .digest('hex');
}

/** Whether the one digest of the data is that of the digests by station, and by month of the year so far, that are listed. */
function checkData({ data, month }) {
  if (!Array.isArray(data?.stations)) return;
  const own = data.stations.map(({ code, intervals, sha256 }) => `${code} ${intervals} ${sha256}`);
  const isRight = digestOfLines(own) === data.sha256;
  say(isRight, `the digest of the intervals is ${isRight ? '' : 'NOT '}that of its ${own.length} stations`);
  if (data.year) {
    const earlier = data.year.stations.flatMap(({ code, months }) =>
      months.map((one) => `${code} ${one.month} ${one.hours} ${one.periods} ${one.sha256}`),
    );
    const isYearRight = digestOfLines(earlier) === data.year.sha256;
    say(
      isYearRight,
      `the digest of the months before is ${isYearRight ? '' : 'NOT '}that of ${earlier.length} months of stations`,
    );
  } else if (!String(month).endsWith('-01')) {
    console.log('       the year to date rests on months before, of which this manifest says nothing');
  }
}

async function checkFile(path, named) {
  const sha256 = await digestOf(path);
  const found = named.find((file) => file.sha256 === sha256);
  const name = basename(path);
  if (found) return say(true, `${name} is ${found.name} as issued (${sha256})`);
  const isNamed = named.some((file) => file.name === name);
  return say(false, `${name} ${isNamed ? 'was changed' : 'is not among the issued files'} (${sha256})`);
}

async function main() {
  if (!keyPath) {
    console.error('Usage: node verify.mjs MANIFEST.json MANIFEST.sig KEY.pem FILE…');
    return 2;
  }
  const text = readFileSync(manifestPath);
  const fingerprint = checkSignature(text);
  let manifest;
  try {
    manifest = JSON.parse(text.toString('utf8'));
    if (!Array.isArray(manifest.files)) throw new Error('it names no files');
  } catch (error) {
    say(false, `the manifest cannot be read: ${error.message}`);
    return 1;
  }
  say(manifest.publicKey === fingerprint, `the manifest names key ${manifest.publicKey}`);
  checkData(manifest);
  for (const path of files) await checkFile(path, manifest.files);
  const { network, month, revision, issuedBy, issuedAt } = manifest;
  console.log(`       ${network?.name}, ${month}, revision ${revision}, issued by ${issuedBy}, ${issuedAt}`);
  if (files.length === 0) console.log('       no file was given: only the manifest was checked');
  console.log(isWrong ? 'Something is wrong: do not rely on it.' : 'Everything is right.');
  return isWrong ? 1 : 0;
}

process.exitCode = await main().catch((error) => {
  console.error(`It could not be checked: ${error.message}`);
  return 2;
});
