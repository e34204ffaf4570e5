import { openSource } from "./source.js";

const data = await openSource().data();
document.getElementById("app")!.textContent = data.title;
