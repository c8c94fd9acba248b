// The page of the panel: takes what the panel sends, draws it, and reports what the reader picks.

import type { Chart, FromPage, ToPage } from "../results";
import type { Frame } from "./chart";
import { replace } from "./mount";
import { HOW_TO_READ, page, picked, Pictures, reading, type State } from "./page";
import { h } from "./tree";

declare function acquireVsCodeApi(): { postMessage(message: FromPage): void };

const editor = acquireVsCodeApi();
const place = document.getElementById("page") as HTMLElement;
const pictures = new Pictures();
const NARROWEST = 320;
const WIDEST = 760;

let state: State | undefined;
let frame: Frame | undefined;
let chart: Chart | undefined;
/** Where the reader reads the curves. */
let speed: number | undefined;

function widthOfPicture(): number {
  const room = document.querySelector(".picture")?.clientWidth ?? document.documentElement.clientWidth - 32;
  return Math.round(Math.min(WIDEST, Math.max(NARROWEST, room)));
}

function render(): void {
  if (state === undefined) {
    return;
  }
  // Taking the old page away takes the keys from its chart for a moment: that is no leaving.
  const at = speed;
  const before = widthOfPicture();
  const made = page(state, before);
  replace(place, made.nodes);
  ({ frame, chart } = made);
  if (widthOfPicture() !== before) {
    // The first page shows how much room there is.
    const again = page(state, widthOfPicture());
    replace(place, again.nodes);
    ({ frame, chart } = again);
  }
  if (at !== undefined) {
    read(at);
  }
}

function heard(message: ToPage): void {
  if (message.type === "nothing") {
    if (state === undefined) {
      replace(place, [h("p", { class: "notice", role: "status" }, message.why)]);
    } else {
      const old = document.getElementById("stale");
      old?.remove();
      const said = document.createElement("p");
      said.id = "stale";
      said.className = "notice";
      said.setAttribute("role", "status");
      said.textContent = `${message.why} What stands below is from before.`;
      place.prepend(said);
    }
    return;
  }
  const { results, choice, spec } = message;
  pictures.keep(results);
  state = { results, choice, spec, old: pictures.before(results) };
  render();
}

/** Puts the reading line at a speed and says what the curves are there. */
function read(at: number | undefined): void {
  speed = at;
  const line = document.getElementById("reader");
  const words = document.getElementById("reading");
  const svg = document.getElementById("chart");
  if (line === null || words === null || svg === null || frame === undefined || chart === undefined) {
    return;
  }
  line.classList.toggle("hidden", at === undefined);
  if (at === undefined) {
    words.textContent = HOW_TO_READ;
    return;
  }
  const x = String(frame.x.at(at));
  line.setAttribute("x1", x);
  line.setAttribute("x2", x);
  words.textContent = reading(chart, at);
  svg.setAttribute("aria-valuenow", String(at));
  svg.setAttribute("aria-valuetext", words.textContent);
}

/** The speed that a key leads to. */
function moved(key: string, coarse: boolean): number | undefined {
  if (frame === undefined || chart === undefined) {
    return undefined;
  }
  const { low, high } = frame.x;
  const step = (high - low) / (coarse ? 10 : 100);
  const reached = chart.points.find((point) => point.reached)?.speed.value;
  const from = speed ?? reached ?? (low + high) / 2;
  const to: Record<string, number> = {
    ArrowLeft: from - step,
    ArrowDown: from - step,
    ArrowRight: from + step,
    ArrowUp: from + step,
    PageDown: from - (high - low) / 10,
    PageUp: from + (high - low) / 10,
    Home: low,
    End: high,
  };
  const wanted = to[key];
  return wanted === undefined ? undefined : Math.min(high, Math.max(low, wanted));
}

window.addEventListener("message", (event: MessageEvent<ToPage>) => heard(event.data));

place.addEventListener("change", (event) => {
  const field = event.target;
  if (state === undefined || !(field instanceof HTMLInputElement || field instanceof HTMLSelectElement)) {
    return;
  }
  const name = field instanceof HTMLSelectElement ? field.id : field.name;
  const choice = picked(state.results, state.choice, name, field.value);
  editor.postMessage({ type: "choose", choice });
});

place.addEventListener("click", (event) => {
  const id = event.target instanceof Element ? (event.target.closest("button")?.id ?? "") : "";
  if (id === "drive-place") {
    editor.postMessage({ type: "reveal", criterion: null });
  } else if (id.startsWith("criterion-")) {
    editor.postMessage({ type: "reveal", criterion: Number(id.slice("criterion-".length)) });
  }
});

place.addEventListener("pointermove", (event) => {
  const svg = event.target instanceof Element ? event.target.closest("#chart") : null;
  if (svg !== null && frame !== undefined) {
    const x = event.clientX - svg.getBoundingClientRect().left;
    read(Math.min(frame.x.high, Math.max(frame.x.low, frame.x.of(x))));
  }
});

place.addEventListener("pointerout", (event) => {
  const to = event.relatedTarget;
  const inside = to instanceof Element && to.closest("#chart") !== null;
  if (!inside && document.activeElement?.id !== "chart") {
    read(undefined);
  }
});

place.addEventListener("focusout", (event) => {
  if (event.target instanceof Element && event.target.id === "chart") {
    read(undefined);
  }
});

place.addEventListener("keydown", (event) => {
  if (event.target instanceof Element && event.target.id === "chart") {
    const to = moved(event.key, event.shiftKey);
    if (to !== undefined) {
      event.preventDefault();
      read(to);
    } else if (event.key === "Escape") {
      read(undefined);
    }
  }
});

let waiting = 0;
new ResizeObserver(() => {
  cancelAnimationFrame(waiting);
  waiting = requestAnimationFrame(render);
}).observe(document.documentElement);

editor.postMessage({ type: "ready" });
