// A file as hand-made ones are: an output shared by two clips, times shared with a translation, numbers spelled oddly, an extension
// that nobody knows, doubled and odd keys, white space everywhere. One channel changes; everything else must stay to the byte.
import { WebIO } from '@gltf-transform/core';
import { validateBytes } from 'gltf-validator';
import { describe, expect, test } from 'vitest';
import { replaceTrack } from '@slewcurve/core';
import { bufferSource, invertPatchPlan, openAnimation, patchedBytes } from '@slewcurve/formats';
import { aboutZ, glb, Packer } from '../../support/gltf-bytes.js';
import { rotationSamplers } from '../../support/independent-gltf.js';

const packer = new Packer();
packer.add('SCALAR', [0, 0.5, 1]);
packer.add('VEC4', [0, 90, 170].flatMap(aboutZ));
packer.add('VEC3', [0, 0, 0, 1, 0, 0, 2, 0, 0]);
const [times, turns, moves] = packer.accessors.map((accessor) => JSON.stringify(accessor));

const TEXT = `{ "asset" : {"version":"2.0",  "extras" : { "scale":1.0, "tiny" : 1e-7 , "serial":12345678901234567890 } } ,
\t"extensionsUsed" : [ "ACME_rig_notes" ],\r
  "nodes" : [ {"name":"Mast","extensions":{"ACME_rig_notes":{"gear":-0.0,"\\u0061b":[ ]}}} , { "name" : "Boom" } ],
  "scenes":[{"nodes":[0 ,1]}] , "scene":0,
  "animations" : [
    { "name":"Sweep","channels":[ {"sampler":0,"target":{"node":0,"path":"rotation"}},
      { "sampler" : 1 , "target" : { "path" : "translation", "node" : 1 } } ] ,
      "samplers":[ {"input":0,"output":1,"extras":{"by":1.50}}, {"input":0 , "output":2} ] },
    {"name":"Sweep again","channels":[{"sampler":0,"target":{"node":0,"path":"rotation"}}],"samplers":[{"output":1,"input":0}]}
  ],
  "accessors" : [ ${times} , ${turns},\n ${moves} ],
  "bufferViews":${JSON.stringify(packer.bufferViews, undefined, 1)},
  "buffers":[ { "byteLength" : ${packer.data.byteLength} } ]
}   `;
const bytes = glb(TEXT, packer.data);

function jsonLength(glbBytes: Uint8Array): number {
  return new DataView(glbBytes.buffer).getUint32(12, true);
}

function text(glbBytes: Uint8Array): string {
  return new TextDecoder().decode(glbBytes.subarray(20, 20 + jsonLength(glbBytes)));
}

describe('one of two clips that share their values is changed', () => {
  const changed = (async () => {
    const file = await openAnimation(bufferSource(bytes), { name: 'sweep.glb' });
    const [track] = file.clips[0].tracks;
    const values = track.values.map((x, i) => (i >= 8 ? -x : x));
    const plan = await file.plan([replaceTrack(track, { values })]);
    return { plan, values, made: patchedBytes(bytes, plan) };
  })();

  test('only it reads otherwise, by a reader that is not ours', async () => {
    const { made, values } = await changed;
    const before = rotationSamplers(bytes);
    const after = rotationSamplers(made);
    expect(after.map(({ clip }) => clip)).toEqual(['Sweep', 'Sweep again']);
    expect(after[0].output).toEqual([...values]);
    expect(after[0].times).toEqual(before[0].times);
    expect(after[1]).toEqual(before[1]);
  });

  test('every byte outside splices, tail and length fields is equal, found without the plan', async () => {
    const { made } = await changed;
    // The JSON: what was inserted is taken out again, and the old text must be left.
    const restored = text(made)
      .replace(`,{"bufferView":3,"componentType":5126,"count":3,"type":"VEC4"} ],`, ' ],')
      .replace(/,\{"buffer":0,"byteOffset":\d+,"byteLength":48\}/, '')
      .replace('"output":3', '"output":1')
      .replace(/"byteLength" : \d+ \} \]/, `"byteLength" : ${packer.data.byteLength} } ]`);
    expect(restored.trimEnd()).toBe(text(bytes).trimEnd());
    for (const spelled of ['1.0', '1e-7', '12345678901234567890', '-0.0', '"\\u0061b":[ ]', '1.50'])
      expect(text(made)).toContain(spelled);
    // The binary chunk: the old one, then 48 bytes.
    const oldBin = bytes.subarray(28 + jsonLength(bytes));
    const newBin = made.subarray(28 + jsonLength(made));
    expect(Buffer.compare(newBin.subarray(0, oldBin.byteLength), oldBin)).toBe(0);
    expect(newBin.byteLength).toBe(oldBin.byteLength + 48);
    expect(new DataView(made.buffer).getUint32(8, true)).toBe(made.byteLength);
  });

  test('the plan names what it touches, and no more', async () => {
    const { plan } = await changed;
    expect(plan.ranges.map(({ what }) => what)).toEqual(
      [
        'length of the file',
        'length of the JSON chunk',
        'JSON /animations/0/samplers/0/output',
        'JSON /accessors',
        'JSON /bufferViews',
        'JSON /buffers/0/byteLength',
        'JSON padding',
        'length of the BIN chunk',
        'appended data',
      ].filter((what) => what !== 'JSON padding' || plan.ranges.some((range) => range.what === what)),
    );
    const undo = await invertPatchPlan(bufferSource(bytes), plan);
    expect(Buffer.compare(patchedBytes((await changed).made, undo), bytes)).toBe(0);
  });

  test('the validator finds nothing new, and glTF-Transform reads it', async () => {
    const { made } = await changed;
    const [before, after] = await Promise.all([bytes, made].map((glbBytes) => validateBytes(glbBytes)));
    expect(after.issues.messages).toEqual(before.issues.messages);
    const document = await new WebIO().readBinary(made);
    expect(
      document
        .getRoot()
        .listAnimations()
        .map((clip) => clip.listChannels().length),
    ).toEqual([2, 1]);
  });
});
