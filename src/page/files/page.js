// What the officer types goes to the program as text; what comes back is shown. Nothing is computed here but places on a picture.
"use strict";

(() => {
  const at = (id) => document.getElementById(id);
  const root = document.documentElement;

  // Night colours, before anything is drawn.
  const remembered = (() => {
    try {
      return localStorage.getItem("night");
    } catch {
      return null;
    }
  })();
  if (remembered) root.className = remembered === "yes" ? "night" : "day";

  // The last answer, the cells it was given for, and what was kept without a book.
  let shown = null;
  let book = null;
  let asks = 0;
  const session = [];

  const make = (tag, text, name) => {
    const element = document.createElement(tag);
    if (text) element.textContent = text;
    if (name) element.className = name;
    return element;
  };
  const fill = (id, ...children) => at(id).replaceChildren(...children);

  async function ask(path, body) {
    const request = body === undefined ? {} : { method: "POST", headers: { "Content-Type": "application/json" }, body: JSON.stringify(body) };
    const reply = await fetch(path, { ...request, cache: "no-store", credentials: "omit" });
    const isJson = (reply.headers.get("Content-Type") || "").startsWith("application/json");
    const content = isJson ? await reply.json() : (await reply.text()).trim();
    if (!reply.ok && !(isJson && content.faults)) throw new Error(content || `answer ${reply.status}`);
    return content;
  }

  function trouble(what, why) {
    const line = at("trouble");
    line.hidden = !what;
    line.textContent = what ? `${what}: ${why.message}` : "";
  }

  // The form.

  const inputs = () => [...at("bearing").querySelectorAll("[name]")];
  const inputOf = (field) => (field === "utc" || field === "ship_time" ? at("time") : document.querySelector(`#bearing [name="${CSS.escape(field)}"]`));
  const isEvent = () => ["rising", "setting"].includes(at("method").value);

  function cells() {
    const typed = {};
    const unseen = (input) => input.closest("[hidden]") !== null;
    for (const input of inputs()) {
      if (input.value.trim() && !unseen(input)) typed[input.name] = input.value.trim();
    }
    if (at("time").value.trim()) typed[at("clock").value] = at("time").value.trim();
    if (typed.method === "none") delete typed.body;
    return typed;
  }

  function note(field, text, name = "note") {
    const input = inputOf(field);
    if (!input) return;
    const id = `${input.id}-${name}`;
    at(id)?.remove();
    if (text) {
      const line = make("p", text, name);
      line.id = id;
      input.closest(".row").append(line);
    }
    const describing = ["fault", "note"].map((kind) => `${input.id}-${kind}`).filter(at);
    if (describing.length) input.setAttribute("aria-describedby", describing.join(" "));
    else input.removeAttribute("aria-describedby");
  }

  function faultsAt(faults) {
    for (const input of [...inputs(), at("time")]) {
      if (!input.hasAttribute("aria-invalid")) continue;
      input.removeAttribute("aria-invalid");
      note(input.id === "time" ? "utc" : input.name, "", "fault");
    }
    let first = null;
    for (const fault of faults) {
      const input = inputOf(fault.field);
      if (!input) continue;
      input.setAttribute("aria-invalid", "true");
      note(fault.field, fault.text, "fault");
      const box = input.closest("details");
      if (box) box.open = true;
      first ??= input;
    }
    return first;
  }

  function shapes() {
    const none = at("method").value === "none";
    at("event").hidden = !isEvent();
    at("limb-row").hidden = at("horizon").value !== "visible";
    at("readings").hidden = none;
    at("body").closest(".row").hidden = none;
    if (none) at("ship").open = true;
  }

  // What comes back.

  function working(id, text) {
    const lines = text.trimEnd().split("\n").map((line) => {
      // A figure ends at the forty-second place; a word about it may stand behind.
      if (line.length > 45 && line[41] !== " " && line.slice(42, 45) === "   ") {
        const whole = make("div", line.slice(0, 42), "figure");
        whole.append(make("span", line.slice(45), "behind"));
        return whole;
      }
      // A line of a table keeps its places; a sentence may go on below.
      return make("div", line, line.match(/\S {2,}(?=\S)/g)?.length > 2 ? "" : "words");
    });
    fill(id, ...lines);
  }

  function figure(name, text, about) {
    const row = make("div");
    row.append(make("dt", name), make("dd", text, "figure"));
    if (about) row.append(make("dd", about, "about"));
    return row;
  }

  function show(answer, typed, loud) {
    const { worked, faults } = answer;
    const none = typed.method === "none" && faults.length === 0;
    shown = worked || none ? { answer, typed } : null;
    const first = faultsAt(faults);
    at("result").hidden = false;
    at("result").className = "";
    at("working-box").hidden = !worked?.working;
    at("keep").hidden = !shown;
    at("added").textContent = "";
    fill("errors");
    fill("faults", ...faults.map((fault) => make("li", `${nameOf(fault.field)}: ${fault.text}`)));
    fill("said");
    if (none) {
      at("result-head").textContent = "No observation";
      fill("said", make("p", typed.remarks ? `Because: ${typed.remarks}` : "Say why in the remarks."));
    } else if (!worked) {
      at("result-head").textContent = faults.length === 1 ? "One thing to put right" : `${faults.length} things to put right`;
      if (loud && first) first.focus();
    } else {
      const { azimuth } = worked;
      at("result-head").textContent = `${typed.body}${azimuth.text ? "" : ": no azimuth"}`;
      const lines = azimuth.text ? [figure(azimuth.name, azimuth.text, `u ${azimuth.u}${azimuth.altitude ? `; altitude ${azimuth.altitude}` : ""}`)] : [];
      for (const error of worked.errors) lines.push(figure(error.name, error.text, `u ${error.u}; for the book ${error.book}`));
      fill("errors", ...lines);
      const said = [
        azimuth.none && `There is no azimuth: ${azimuth.none}.`,
        azimuth.text && !worked.errors.length && "No bearing is typed yet: the azimuth alone.",
        worked.trust && `Trust: ${worked.trust}`,
        ...worked.limits,
        ...worked.card,
        ...worked.like,
        ...worked.notices.map((notice) => `Notice: ${notice.text}`),
        answer.book_unread && `The book could not be read: ${answer.book_unread}`,
      ];
      fill("said", ...said.filter(Boolean).map((text) => make("p", text)));
      if (worked.working) working("working", worked.working);
    }
    const keepable = none ? Boolean(typed.remarks) : Boolean(worked?.errors.length);
    at("add").disabled = !keepable || faults.length > 0;
    record(answer.record, worked);
    if (loud && !first) at("result").scrollIntoView({ block: "nearest" });
  }

  const nameOf = (field) => document.querySelector(`label[for="${CSS.escape(inputOf(field)?.id || "")}"]`)?.textContent || field;

  function old() {
    if (at("result").hidden || at("result").className === "old") return;
    at("result").className = "old";
    at("result-head").textContent = "Changed since: Enter works it again";
    at("add").disabled = true;
  }

  async function work(loud) {
    const typed = cells();
    const asked = ++asks;
    try {
      const answer = await ask("answer", { cells: typed, session });
      trouble();
      // A later question has overtaken this one.
      if (asked !== asks) return;
      show(answer, typed, loud);
      // Typed on meanwhile: what is shown, and could be added, is not what stands in the form.
      if (JSON.stringify(cells()) !== JSON.stringify(typed)) old();
    } catch (why) {
      trouble("It could not be worked", why);
    }
  }

  async function keep() {
    if (!shown || at("add").disabled) return;
    at("add").disabled = true;
    const { typed } = shown;
    try {
      let words;
      if (book) {
        const made = await ask("add", { cells: typed });
        if (made.faults) {
          faultsAt(made.faults)?.focus();
          at("added").textContent = `Not entered: ${made.faults.map((fault) => fault.text).join("; ")}`;
          return;
        }
        words = [`Entered in ${book} as entry ${made.entry}. Seal ${made.seal.slice(0, 17)}.`, ...made.found].join(" ");
      } else {
        session.push(typed);
        if (session.length > 40) session.shift();
        words = "Kept until the page is closed.";
      }
      await remember(typed);
      at("added").textContent = words;
      trouble();
    } catch (why) {
      // Whether it was entered is not known where the answer was lost.
      at("add").disabled = false;
      trouble("Not entered, or the answer was lost: look at the record before it is entered again", why);
    }
  }

  // The record after an entry; the result stays as it was when it was entered.
  async function remember(typed) {
    const answer = await ask("answer", { cells: typed, session });
    record(answer.record, null);
  }

  async function next() {
    const typed = cells();
    if (!(typed.utc || typed.ship_time) || !typed.lat || !typed.lon) return;
    try {
      const { next: plan } = await ask("answer", { cells: typed, session, next: true });
      if (!plan) return;
      const items = plan.list.map((one) => {
        const item = make("li");
        const words = make("span");
        const name = one.method === "azimuth" ? one.body : `${one.body} ${one.method}`;
        words.append(make("strong", `${name}, ${one.when}`), make("span", `${one.best ? " (best)" : ""}: ${one.text}`));
        const take = make("button", "Take");
        take.type = "button";
        take.setAttribute("aria-label", `Take ${name}`);
        take.addEventListener("click", () => {
          at("body").value = one.body;
          at("method").value = one.method;
          shapes();
          old();
          at(isEvent() ? "horizon" : "gyro_bearing").focus();
        });
        item.append(words, take);
        return item;
      });
      fill("next", ...items);
      const clock = typed.zone ? "ship's time" : "UTC";
      at("next-about").textContent = items.length ? `In the four hours from that time; ${clock}.` : "Nothing can be observed in the next four hours.";
      working("plan", plan.text);
      at("plan-box").hidden = false;
    } catch (why) {
      trouble("What to take next is not known", why);
    }
  }

  // The record.

  let plotted = null;

  function record(kept, worked) {
    plotted = { kept, worked };
    const { entries, strip } = kept;
    at("strip-words").textContent = strip.words;
    at("record-box").hidden = entries.length === 0;
    const where = book ? `The book is ${book}.` : "No book was given when the page was started: what is kept here goes when it is closed.";
    at("record-about").textContent = entries.length ? `${where} East (low) is up, broken lines are the limits, the newest is on the right.` : `${where} There is no entry yet.`;
    fill("record", ...entries.toReversed().map((entry) => {
      const parts = [
        entry.gyro_error && `gyro error ${entry.gyro_error}`,
        entry.compass_error && `compass error ${entry.compass_error}`,
        entry.deviation && `deviation ${entry.deviation}${entry.compass_heading ? ` on ${entry.compass_heading}` : ""}`,
        book && entry.kept === "here" && "not in the book",
      ];
      return make("li", `${entry.when} UTC ${entry.body}: ${parts.filter(Boolean).join(", ")}`);
    }));
    draw();
  }

  function draw() {
    if (!plotted) return;
    plot("strip", 26);
    plot("record-plot", 90);
  }

  const PLACES = 30;

  function plot(id, height) {
    const width = Math.max(at(id).clientWidth, 240);
    const svg = shape("svg", { viewBox: `0 0 ${width} ${2 * height + 4}`, height: 2 * height + 4, "aria-hidden": "true" });
    const { kept, worked } = plotted;
    const now = worked?.figures || {};
    row(svg, 0, width, height, "gyro L/H", kept.entries.map((e) => e.gyro_error_deg), now.gyro_error ?? null, kept.strip.gyro_limit_deg);
    const deviation = now.deviation ?? now.deviation_by_comparison ?? null;
    row(svg, height + 4, width, height, "dev. E/W", kept.entries.map((e) => e.deviation_deg), deviation, kept.strip.deviation_limit_deg);
    fill(id, svg);
  }

  function shape(tag, attributes, text) {
    const element = document.createElementNS("http://www.w3.org/2000/svg", tag);
    for (const [name, value] of Object.entries(attributes)) element.setAttribute(name, value);
    if (text) element.textContent = text;
    return element;
  }

  // East (low) up. The one that is worked but not kept yet is an open circle.
  function row(svg, top, width, height, name, past, now, limit) {
    const left = 62;
    const right = width - 34;
    const sizes = [...past, now].filter((deg) => deg !== null && deg !== undefined).map(Math.abs);
    const reach = Math.max(1, Math.ceil(Math.max(...sizes, 0) * 1.15));
    const y = (deg) => top + height / 2 - (deg / reach) * (height / 2 - 4);
    svg.append(shape("text", { x: 0, y: top + height / 2 + 4 }, name));
    svg.append(shape("text", { x: width, y: top + height / 2 + 4, "text-anchor": "end" }, `\u00b1${reach}`));
    svg.append(shape("line", { class: "axis", x1: left, x2: right, y1: y(0), y2: y(0) }));
    for (const side of limit && limit <= reach ? [limit, -limit] : []) {
      svg.append(shape("line", { class: "limit", x1: left, x2: right, y1: y(side), y2: y(side) }));
    }
    const step = (right - left) / PLACES;
    const x = (place) => right - (place + 0.5) * step;
    const shift = now === null || now === undefined ? 0 : 1;
    past.toReversed().slice(0, PLACES - shift).forEach((deg, place) => {
      if (deg !== null) svg.append(shape("circle", { cx: x(place + shift), cy: y(deg), r: 3.2, fill: "currentColor" }));
    });
    if (shift) svg.append(shape("circle", { class: "last", cx: x(0), cy: y(now), r: 4.2 }));
  }

  // Time and the ship's instruments.

  async function clock(when) {
    try {
      const { utc, from } = await ask("clock");
      at("clock").value = "utc";
      at("time").value = utc;
      note("utc", `${from}, ${when}`);
      old();
    } catch (why) {
      trouble("The clock could not be read", why);
    }
  }

  let heard = null;

  async function listen() {
    try {
      heard = await ask("nmea");
      const lines = heard.items.map((item) => make("li", `${item.name} ${item.text} (${item.from})${item.why_not ? `; not taken: ${item.why_not}` : ""}`));
      for (const doubt of heard.doubts) lines.push(make("li", `Notice: ${doubt}`));
      if (heard.state) lines.unshift(make("li", `${heard.source}: ${heard.state}`));
      if (!lines.length) lines.push(make("li", `${heard.source}: nothing heard yet`));
      fill("heard", ...lines);
    } catch (why) {
      // A figure that is not followed by another is no longer true.
      heard = null;
      fill("heard", make("li", `not heard: ${why.message}`));
    }
    at("take").disabled = !heard?.items.some((item) => !item.why_not);
    setTimeout(listen, 2000);
  }

  function take() {
    for (const item of heard?.items || []) {
      if (item.why_not) continue;
      if (item.field === "utc") at("clock").value = "utc";
      const input = inputOf(item.field);
      if (!input) continue;
      input.value = item.text;
      note(item.field, `from the instruments: ${item.from}`);
    }
    old();
    next();
  }

  // Everything to its place.

  document.addEventListener("DOMContentLoaded", async () => {
    const night = at("night");
    night.setAttribute("aria-pressed", String(root.className === "night"));
    night.addEventListener("click", () => {
      const on = root.className !== "night";
      root.className = on ? "night" : "day";
      night.setAttribute("aria-pressed", String(on));
      try {
        localStorage.setItem("night", on ? "yes" : "no");
      } catch {
        // Then it is not remembered.
      }
    });
    at("bearing").addEventListener("submit", (event) => {
      event.preventDefault();
      work(true);
      next();
    });
    at("bearing").addEventListener("input", (event) => {
      old();
      if (event.target.id === "time") note("utc", "");
      else if (event.target.name) note(event.target.name, "");
    });
    at("bearing").addEventListener("change", (event) => {
      shapes();
      if (!at("result").hidden) work(false);
      if (["clock", "time", "zone", "lat", "lon"].includes(event.target.id)) next();
    });
    at("now").addEventListener("click", () => clock("when Now was pressed"));
    at("take").addEventListener("click", take);
    at("add").addEventListener("click", keep);
    document.addEventListener("keydown", (event) => {
      if (event.key === "Enter" && event.ctrlKey) {
        event.preventDefault();
        keep();
      }
    });
    window.addEventListener("resize", draw);
    at("record-box").addEventListener("toggle", draw);
    try {
      const start = await ask("start");
      fill("body", ...start.bodies.map((name) => new Option(name, name)));
      for (const [field, text] of Object.entries(start.given)) {
        const input = inputOf(field);
        if (input) input.value = text;
      }
      book = start.book;
      at("add").textContent = book ? `Add to the book (${book})` : "Keep until the page is closed";
      at("add-about").textContent = book ? "Ctrl and Enter together add it." : "Ctrl and Enter together keep it. No book was given when the page was started.";
      at("instruments").hidden = !start.nmea;
      shapes();
      await clock("when the page was opened; press Now at the bearing");
      const { record: kept } = await ask("answer", { cells: {} });
      record(kept, null);
      if (start.nmea) listen();
    } catch (why) {
      trouble("The program does not answer", why);
    }
  });
})();
