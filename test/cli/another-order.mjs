// A file system that lists its folders the other way round. Loaded before anything else, with --import.

import fs from "node:fs";
import { syncBuiltinESMExports } from "node:module";

const { readdir } = fs.promises;
fs.promises.readdir = async (...args) => (await readdir(...args)).reverse();
const { readdirSync } = fs;
fs.readdirSync = (...args) => readdirSync(...args).reverse();
syncBuiltinESMExports();
