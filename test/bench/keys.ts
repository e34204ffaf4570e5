/** Keys, bytes and time of our clips beside those of a general keyframe resampler (glTF-Transform's) on recorded bakes. */

import { Document } from "@gltf-transform/core";
import { resample } from "@gltf-transform/functions";
import type { Body } from "../../src/clip/body.js";
import { type ClipStyle, clipTrack } from "../../src/clip/clip-track.js";
import { linearRotationKeys } from "../../src/clip/linear-rotation.js";
import { playTrack } from "../../src/clip/play-track.js";
import { sampleFlight } from "../../src/clip/sampled-flight.js";
import { floatStore } from "../../src/clip/store-rotation.js";
import type { Track } from "../../src/clip/track.js";
import type { Flight } from "../../src/flight/flight.js";
import { angleBetween, rotate } from "../../src/math/quat.js";
import { add, distance, subtract } from "../../src/math/vec3.js";
import { plannedFlights } from "../clip/flights.js";
import { addClip, type ClipChannels, io } from "./documents.js";
import { secondsEach } from "./measure.js";
import { duration, figure, type Section } from "./section.js";

const body = { centerOfMass: [0, 0, 0], axes: [0, 0, 0, 1], reach: 0.15 } as const;
/** What two nodes are for: the model's origin is not the centre of mass. */
const offCenter = { ...body, centerOfMass: [0, 0.1, 0] } as const;
const LOOKS_PER_SECOND = 1000;

const numbersIn = (channel: { times: Float32Array; values: ArrayLike<number> & { byteLength: number } }) =>
  channel.times.byteLength + channel.values.byteLength;

/** A key every 1/rate s and at the end. */
function recorded(flight: Flight, rate: number, { centerOfMass }: Body = body): ClipChannels {
  const end = Math.fround(flight.duration);
  const times = [...Array(Math.ceil(flight.duration * rate - 1e-6)).keys()].map((i) => i / rate).concat(end);
  const at = times.map((t) => Math.min(t, flight.duration));
  return {
    translation: {
      times: Float32Array.from(times),
      values: Float32Array.from(
        at.flatMap((t) => [...subtract(flight.centerOfMass(t), rotate(flight.orientation(t), centerOfMass))]),
      ),
    },
    rotation: {
      times: Float32Array.from(times),
      values: Float32Array.from(at.flatMap((t) => [...flight.orientation(t)])),
    },
  };
}

function documentOf(clip: ClipChannels): Document {
  const document = new Document();
  document.createBuffer();
  const node = document.createNode("prop");
  document.createScene().addChild(node);
  addClip(document, node, "throw", clip);
  return document;
}

async function resampled(clip: ClipChannels, tolerance: number): Promise<ClipChannels> {
  const document = documentOf(clip);
  await document.transform(resample({ tolerance, cleanup: false }));
  const [animation] = document.getRoot().listAnimations();
  const channel = (path: string) => {
    const sampler = animation
      .listChannels()
      .find((one) => one.getTargetPath() === path)!
      .getSampler()!;
    return {
      times: sampler.getInput()!.getArray() as Float32Array,
      values: sampler.getOutput()!.getArray() as Float32Array,
    };
  };
  return { translation: channel("translation"), rotation: channel("rotation") };
}

/** Greatest displacement seen: of the rotation alone, or of a body moved by both channels. */
function seenError(clip: ClipChannels, flight: Flight, joint?: Body): number {
  const interpolation = "LINEAR";
  const track: Track = {
    duration: flight.duration,
    error: 0,
    translation: { interpolation, ...clip.translation },
    rotation: { interpolation, ...clip.rotation },
  };
  let greatest = 0;
  const count = Math.ceil(flight.duration * LOOKS_PER_SECOND);
  for (let i = 0; i <= count; i++) {
    const t = (flight.duration * i) / count;
    const pose = playTrack(track, t);
    const turned = 2 * body.reach * Math.sin(angleBetween(pose.rotation, flight.orientation(t)) / 2);
    const moved = joint
      ? distance(add(pose.translation, rotate(pose.rotation, joint.centerOfMass)), flight.centerOfMass(t))
      : 0;
    greatest = Math.max(greatest, turned + moved);
  }
  return greatest;
}

/** The resampled bake at the coarsest of its tolerances that keeps the bound; the bake itself where none does. */
async function justWithin(flight: Flight, rate: number, bound: number, joint?: Body): Promise<ClipChannels> {
  const clip = recorded(flight, rate, joint);
  let best = clip;
  let low = 1e-7;
  let high = 0.1;
  for (let i = 0; i < 14; i++) {
    const tolerance = Math.sqrt(low * high);
    const made = await resampled(clip, tolerance);
    if (seenError(made, flight, joint) <= bound) {
      low = tolerance;
      best = made;
    } else high = tolerance;
  }
  return best;
}

const keyCount = ({ times }: { times: Float32Array }) => times.length;
const sum = (values: number[]) => values.reduce((a, b) => a + b, 0);

export const keys: Section = {
  name: "keys",
  about:
    "The twelve flights of test/clip/flights.ts, reach 0.15 m. Keys and bytes of rotation alone unless both channels are named; the worst clip's part beside.",
  async run() {
    const flights = plannedFlights();
    const rows: string[][] = [];
    for (const bound of [0.001, 0.005]) {
      const at = `${bound * 1000} mm`;
      const general = await Promise.all(flights.map((flight) => justWithin(flight, 60, bound)));
      const joint = async (about: Body) => {
        const clips = await Promise.all(flights.map((flight) => justWithin(flight, 120, bound, about)));
        return sum(clips.map(({ translation, rotation }) => keyCount(translation) + keyCount(rotation)));
      };
      const generalKeys = general.map(({ rotation }) => keyCount(rotation));
      const generalBytes = sum(general.map(({ rotation }) => numbersIn(rotation)));
      const tracks = (style: ClipStyle) => flights.map((flight) => clipTrack(flight, body, bound, style));
      const greedy = (offCurve: boolean) =>
        flights.map((flight) => {
          const motion = sampleFlight(flight, body, bound);
          return linearRotationKeys(motion, bound - motion.surcharge, floatStore, offCurve)!.indices.length;
        });
      const alone = (style: ClipStyle) => tracks({ ...style, layout: "turn-only" });
      const row = (what: string, found: number, against: number, of: string, most = "") =>
        rows.push([at, what, String(found), (found / against).toFixed(3), most, of]);
      rows.push([at, "resample() on 60 Hz", String(sum(generalKeys)), "", "", ""]);
      const cubic = alone({ keys: "cubic" }).map(({ rotation }) => keyCount(rotation));
      const worst = Math.max(...cubic.map((count, i) => count / generalKeys[i]));
      row("cubic keys", sum(cubic), sum(generalKeys), "resample() on 60 Hz", worst.toFixed(2));
      const onCurve = sum(greedy(false));
      row("linear keys on the curve", onCurve, sum(generalKeys), "resample() on 60 Hz");
      row("linear keys beside it", sum(greedy(true)), onCurve, "those on it");
      for (const pack of ["float", "int16"] as const) {
        const bytes = sum(alone({ keys: "smallest", pack }).map(({ rotation }) => numbersIn(rotation)));
        row(`smallest bytes, ${pack}`, bytes, generalBytes, "resample() on 60 Hz");
      }
      const two = sum(
        tracks({ keys: "cubic", layout: "two-node" }).map(
          ({ translation, rotation }) => keyCount(translation) + keyCount(rotation),
        ),
      );
      row(
        "two nodes, cubic, both channels",
        two,
        await joint(offCenter),
        "resample() on 120 Hz, origin 0.1 m off",
      );
      row("the same", two, await joint(body), "resample() on 120 Hz, origin at the centre");
      const cut = (style: ClipStyle) => ({
        run: () => {
          for (const flight of flights) clipTrack(flight, body, bound, style);
        },
      });
      const times = await secondsEach(
        [
          {
            run: async () => {
              for (const flight of flights) {
                const document = documentOf(recorded(flight, 240));
                await document.transform(resample());
                await io.writeBinary(document);
              }
            },
          },
          cut({}),
          cut({ keys: "cubic" }),
          cut({ keys: "cubic", layout: "two-node" }),
          cut({ keys: "smallest" }),
        ],
        4,
      );
      const names = ["resample() on 240 Hz and writing", "linear", "cubic", "cubic, two nodes", "smallest"];
      names.forEach((name, i) => {
        rows.push([
          at,
          `time a clip, ${name}`,
          duration(times[i] / 12),
          figure(times[i] / times[0]),
          "",
          names[0],
        ]);
      });
    }
    return { head: ["bound", "what", "", "part", "worst clip", "of"], rows };
  },
};
