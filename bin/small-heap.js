import { setFlagsFromString } from "node:v8";

// Keeps V8's new space, in all threads, at the size it starts with, so it comes before anything that fills it. Takes leave next to nothing behind; a new
// space that grows with what they use meanwhile makes a long bake a third larger than a short one, and no quicker. Later versions of Node may know no such
// flag, and would complain.
if (Number.parseInt(process.versions.node, 10) <= 24) setFlagsFromString("--semi-space-growth-factor=1");
