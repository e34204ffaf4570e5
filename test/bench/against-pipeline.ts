import type { Document } from "@gltf-transform/core";
import { resample } from "@gltf-transform/functions";
import { oneNodeGraft } from "../../src/bake/graft.js";
import type { LoadedProp } from "../../src/bake/props.js";
import { cutTake, solveTake, type Take, toleranceOf } from "../../src/bake/take.js";
import { type Body, linearTrack } from "../../src/clip/linear.js";
import type { Track } from "../../src/clip/track.js";
import { type Flight, fly } from "../../src/flight/flight.js";
import { spliceGlb } from "../../src/gltf/splice.js";
import type { ThrowFile } from "../../src/throwfile/types.js";
import { takeNumbers } from "../../src/throwfile/types.js";
import { worstDisplacement } from "../clip/displacement.js";
import { openDemo } from "./demo.js";
import { addClip, type ClipChannels, io, nodeOverScene, readClips } from "./documents.js";
import { Engine } from "./engine.js";
import { type Contestant, secondsEach } from "./measure.js";
import { figure, type Section } from "./section.js";

const THROWS = ["spanner-tumble", "token-flip", "quoit-to-peg", "oar-end-over-end", "crate-slips"];
const FRAMES_PER_SECOND = 60;
/** Moments a second at which what is played is held against the true flight: off the frames too. */
const LOOKS_PER_SECOND = 960;

export const againstPipeline: Section = {
  name: "clips",
  about: `All takes of a demo throw, from their launches to one GLB in memory: linear keys within the tolerance, against Rapier at 240 steps a
second, recorded at 60 frames a second, with and without glTF-Transform's resample() (its own tolerance, its default resampler), and against
merely writing as many keys as ours with glTF-Transform. Keys of both channels and bytes a take; the error is the greatest
displacement of any point of the prop, the file's keys played as glTF says, from the true flight. "ours is": our takes a second over that way's.`,
  async run() {
    const demo = await openDemo();
    const engine = await Engine.load();
    const contests = THROWS.map((name) => {
      const { entry, loaded } = demo.throwOf(name);
      const takes = takeNumbers(entry.takes).map((take) => solveTake(demo.file, entry, loaded.prop, take));
      const bare = spliceGlb(loaded.model, { nodes: [], clips: [] });
      return { name, loaded, takes, bare, ways: waysOf(demo.file, loaded, bare, takes, engine) };
    });
    for (const { ways } of contests) await secondsEach(ways, 2);

    const rows: string[][] = [];
    const total = { takes: 0, seconds: contests[0].ways.map(() => 0) };
    for (const { name, loaded, takes, bare, ways } of contests) {
      const seconds = await secondsEach(ways, 5);
      total.takes += takes.length;
      for (const [i, way] of ways.entries()) {
        total.seconds[i] += seconds[i];
        const glb = await way.run((await way.prepare?.()) as Document);
        const { keys, error } = await played(glb, takes, bodyOf(loaded));
        rows.push([
          i === 0 ? `${name} (${takes.length})` : "",
          way.label,
          ...speeds(takes.length, seconds, i),
          figure(keys / takes.length),
          Math.round((glb.length - bare.length) / takes.length).toString(),
          figure(error * 1000),
        ]);
      }
    }
    for (const [i, { label }] of contests[0].ways.entries())
      rows.push([
        i === 0 ? `all (${total.takes})` : "",
        label,
        ...speeds(total.takes, total.seconds, i),
        "",
        "",
        "",
      ]);
    return { head: ["throw (takes)", "way", "takes/s", "ours is", "keys", "bytes", "error mm"], rows };
  },
};

/** Takes a second, and how many times as many ours makes. */
const speeds = (takes: number, seconds: readonly number[], way: number): string[] => [
  figure(takes / seconds[way]),
  `${figure(seconds[way] / seconds[0])}×`,
];

const bodyOf = ({ prop }: LoadedProp): Body => ({
  centerOfMass: prop.centerOfMass,
  axes: prop.principal.axes,
  reach: prop.reach,
});

interface Way extends Contestant<Document> {
  label: string;
  /** Uses up `document`, the prop's model. */
  run(document: Document): Uint8Array | Promise<Uint8Array>;
}

function waysOf(
  file: ThrowFile,
  loaded: LoadedProp,
  bare: Uint8Array,
  takes: readonly Take[],
  engine: Engine,
): Way[] {
  const { prop, model } = loaded;
  const body = bodyOf(loaded);
  const tolerance = toleranceOf(file, prop);
  const clipName = (i: number) => `take ${i + 1}`;
  const prepare = () => io.readBinary(bare);
  const written = (document: Document, clips: readonly ClipChannels[]) => {
    const node = nodeOverScene(document, prop.name);
    for (const [i, clip] of clips.entries()) addClip(document, node, clipName(i), clip);
  };
  const recorded = (document: Document) =>
    written(
      document,
      takes.map(({ aimed }) => {
        const { times, translations, rotations } = engine.record(aimed.launch, body, FRAMES_PER_SECOND);
        return { translation: { times, values: translations }, rotation: { times, values: rotations } };
      }),
    );
  const cut = takes.map((take) => cutTake(file, prop, take));
  return [
    {
      label: "tossbake",
      run: () =>
        spliceGlb(
          model,
          oneNodeGraft(
            prop,
            takes.map(({ aimed }, i) => ({
              name: clipName(i),
              track: linearTrack(fly(aimed.launch), body, tolerance),
              extras: {},
            })),
          ),
        ),
    },
    {
      label: "engine 60 Hz + resample()",
      prepare,
      async run(document) {
        recorded(document);
        await document.transform(resample());
        return io.writeBinary(document);
      },
    },
    {
      label: "engine 60 Hz",
      prepare,
      run(document) {
        recorded(document);
        return io.writeBinary(document);
      },
    },
    {
      label: "merely writing our keys",
      prepare,
      run(document) {
        written(document, cut);
        return io.writeBinary(document);
      },
    },
  ];
}

/** What a player shows of the file: keys of all its clips, and the greatest displacement, m. */
async function played(glb: Uint8Array, takes: readonly Take[], body: Body) {
  const clips = await readClips(glb);
  const keys = clips.reduce(
    (sum, { translation, rotation }) => sum + translation.times.length + rotation.times.length,
    0,
  );
  const error = Math.max(...clips.map((clip, i) => greatestDisplacement(clip, takes[i].flight, body)));
  return { keys, error };
}

function greatestDisplacement(clip: ClipChannels, flight: Flight, body: Body): number {
  const interpolation = "LINEAR";
  const track: Track = {
    translation: { interpolation, ...clip.translation },
    rotation: { interpolation, ...clip.rotation },
    duration: flight.duration,
    error: 0,
  };
  let greatest = 0;
  const count = Math.ceil(flight.duration * LOOKS_PER_SECOND);
  for (let i = 0; i <= count; i++)
    greatest = Math.max(
      greatest,
      worstDisplacement(track, flight, body, (flight.duration * i) / count, [0.6, 0, 0.8]),
    );
  return greatest;
}
