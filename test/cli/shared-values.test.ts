// A rotation output that two clips share and times that a translation shares, in JSON that is spelled oddly: after `choose side` on one
// channel, only that one changes. Read back by test/support/independent-gltf.ts, which imports nothing of ours.
import { readFileSync, writeFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { Packer, aboutZ, glb } from '../support/gltf-bytes.js';
import { glbChunks, rotationSamplers } from '../support/independent-gltf.js';
import { commandFolder } from '../support/run-command.js';

const packer = new Packer();
packer.add('SCALAR', [0, 0.5, 1]);
packer.add('VEC4', [0, 180, 270].flatMap(aboutZ));
packer.add('VEC3', [0, 0, 0, 1, 0, 0, 2, 0, 0]);
const [times, turns, moves] = packer.accessors.map((accessor) => JSON.stringify(accessor));
const SPELLED = [
  '"scale":1.0',
  '"tiny" : 1e-7',
  '"serial":12345678901234567890',
  '"gear":-0.0',
  '"by":1.50',
  '\t"extensionsUsed"',
];
const TEXT = `{ "asset" : {"version":"2.0",  "extras" : { "scale":1.0, "tiny" : 1e-7 , "serial":12345678901234567890 } } ,
\t"extensionsUsed" : [ "ACME_rig_notes" ],\r
  "nodes" : [ {"name":"Mast","extensions":{"ACME_rig_notes":{"gear":-0.0}}} , { "name" : "Boom" } ],
  "animations" : [
    { "name":"Sweep","channels":[ {"sampler":0,"target":{"node":0,"path":"rotation"}},
      { "sampler" : 1 , "target" : { "path" : "translation", "node" : 1 } } ] ,
      "samplers":[ {"input":0,"output":1,"extras":{"by":1.50}}, {"input":0 , "output":2} ] },
    {"name":"Sweep again","channels":[{"sampler":0,"target":{"node":0,"path":"rotation"}}],"samplers":[{"output":1,"input":0}]}
  ],
  "accessors" : [ ${times} , ${turns},\n ${moves} ],
  "bufferViews":${JSON.stringify(packer.bufferViews)},
  "buffers":[ { "byteLength" : ${packer.data.byteLength} } ]
}   `;

test('choose side on one of two clips that share their values leaves the other, and the translation, as they are', async () => {
  const at = await commandFolder();
  const original = glb(TEXT, packer.data);
  writeFileSync(at.path('sweep.glb'), original);
  const card = {
    schemaVersion: 1,
    steps: [{ verb: 'choose side', clip: 'Sweep', track: 'Mast', keys: [1], axis: [0, 0, 1] }],
  };
  writeFileSync(at.path('card.json'), JSON.stringify(card));
  const ran = await at.run(
    'mend',
    'sweep.glb',
    '--card',
    'card.json',
    '-o',
    'out.glb',
    '--undo-out',
    'undo.json',
    '--fail-at',
    'error',
  );
  expect(ran.stderr).not.toContain('slewcurve:');
  const made = new Uint8Array(readFileSync(at.path('out.glb')));

  const before = rotationSamplers(original);
  const after = rotationSamplers(made);
  expect(after.map(({ clip, times: keys }) => [clip, keys.length])).toEqual([
    ['Sweep', 4],
    ['Sweep again', 3],
  ]);
  expect(after[1]).toEqual(before[1]);
  // The translation reads the accessors that it read, and their bytes are where and what they were.
  const [old, now] = [glbChunks(original), glbChunks(made)];
  expect(now.json.animations[0].samplers[1]).toEqual(old.json.animations[0].samplers[1]);
  for (const accessor of [0, 1, 2])
    expect(now.json.accessors[accessor]).toEqual(old.json.accessors[accessor]);
  const bin = ({ bin: view }: typeof old, length: number): Buffer =>
    Buffer.from(view.buffer, view.byteOffset, length);
  expect(bin(now, old.bin.byteLength).equals(bin(old, old.bin.byteLength))).toBe(true);
  const json = Buffer.from(made).toString('utf8', 20);
  for (const spelled of SPELLED) expect(json).toContain(spelled);

  // The plan back names JSON splices, length fields and the tail alone, and gives every byte back.
  const undo: { ranges: { what: string }[] } = JSON.parse(readFileSync(at.path('undo.json'), 'utf8'));
  for (const { what } of undo.ranges)
    expect(what).toMatch(/^(undo of )?(JSON |length of the |appended data)/);
  expect((await at.run('mend', 'out.glb', '--undo', 'undo.json', '-o', 'back.glb')).code).toBe(0);
  expect(readFileSync(at.path('back.glb')).equals(Buffer.from(original))).toBe(true);
});
