"use strict";
// Reads the response surface between its runs by straight lines. Outside of what was run it shows nothing.
(() => {
  const at = (id) => document.getElementById(id);
  const runs = JSON.parse(at("explorer-runs").textContent);
  const axes = [
    { name: "warming", key: runs.warming_key, places: runs.warmings, start: runs.start, reference: runs.reference },
    { name: "precipitation", key: "precipitation_change_pct", places: runs.changes_pct, start: 0, reference: 0 },
  ].map((axis) => ({ ...axis, slider: at(`explorer-${axis.name}`), typed: at(`explorer-${axis.name}-typed`) }));
  const columns = runs.changes_pct.length;
  const said = runs.words;

  // Numbers as the rest of the page writes them.
  const fixed = (value, decimals) => {
    const scale = 10 ** decimals;
    const text = (Math.round(Math.abs(value) * scale) / scale).toFixed(decimals);
    const [whole, fraction] = text.split(".");
    const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, "\u2009") : whole;
    const sign = value < 0 && Number(text) !== 0 ? "\u2212" : "";
    return sign + grouped + (fraction ? `.${fraction}` : "");
  };
  const signed = (value, decimals) => {
    const text = fixed(value, decimals);
    return value > 0 && /[1-9]/.test(text) ? `+${text}` : text;
  };
  const decimals = (row, value) => {
    const limit = row.decimals.below.find(([limit]) => Math.abs(value) < limit);
    return limit ? limit[1] : row.decimals.otherwise;
  };
  const date = (day) => {
    const [month, first] = runs.water_year_starts;
    const whole = Math.max(1, Math.round(day));
    const found = new Date(Date.UTC(month > 1 || first > 1 ? 2001 : 2002, month - 1, first + whole - 1));
    return `${found.getUTCDate()} ${runs.months[found.getUTCMonth()]}`;
  };
  const say = (words, parts) => words.replace(/\{(\w+)\}/g, (_, name) => parts[name]);
  const moved = (days) => {
    const whole = Math.round(Math.abs(days));
    if (whole === 0) return said.unchanged;
    const [one, several] = days < 0 ? said.earlier : said.later;
    return whole === 1 ? one : say(several, { days: whole });
  };
  const written = (row, value) => (row.kind === "date" ? date(value) : `${fixed(value, decimals(row, value))} ${row.unit}`);
  const changed = (row, change, reference) => {
    if (row.kind === "date") return moved(change);
    const percent = row.least_for_percent !== null && reference >= row.least_for_percent;
    const share = percent ? ` (${signed((100 * change) / reference, 0)}\u00a0%)` : "";
    return `${signed(change, decimals(row, change))} ${row.unit_of_change}${share}`;
  };

  // The nodes around a place, each with its weight; none beyond the ends.
  const around = (places, value) => {
    const last = places.length - 1;
    if (!(value >= places[0] && value <= places[last])) return null;
    const above = places.findIndex((place) => place >= value);
    if (places[above] === value) return [[above, 1]];
    const part = (value - places[above - 1]) / (places[above] - places[above - 1]);
    return [[above - 1, 1 - part], [above, part]];
  };
  const nodes = ([warming, change]) => {
    const [warmings, changes] = [around(runs.warmings, warming), around(runs.changes_pct, change)];
    if (!warmings || !changes) return null;
    return warmings.flatMap(([i, a]) => changes.map(([j, b]) => [i * columns + j, a * b]));
  };
  const read = (values, around) => around.reduce((sum, [node, weight]) => {
    const value = values[node];
    return sum === null || value === null || value === undefined ? null : sum + weight * value;
  }, 0);
  const largest = (values, around) => {
    const known = around.map(([node]) => values[node]);
    return known.some((value) => value === null || value === undefined) ? null : Math.max(...known);
  };

  const reference = nodes([runs.reference, 0]);
  const none = "\u2013";
  const rows = (table, of) => {
    const body = table.tBodies[0];
    return of.map((row) => {
      const line = body.insertRow();
      const head = document.createElement("th");
      head.scope = "row";
      head.textContent = row.title;
      line.append(head);
      return { row, cell: () => line.insertCell() };
    });
  };
  const basin = rows(at("explorer-basin"), runs.measures).map(({ row, cell }) => ({ row, cells: [cell(), cell(), cell()] }));
  const bands = rows(at("explorer-bands"), runs.bands).map(({ row, cell }) => {
    const cells = [cell(), cell(), cell(), cell()];
    const bar = document.createElement("span");
    bar.className = "bar";
    bar.setAttribute("aria-hidden", "true");
    const share = document.createElement("span");
    cells[3].className = "text";
    cells[3].append(bar, share);
    return { row, cells, bar, share };
  });

  const short = (value) => signed(value, Number.isInteger(value) ? 0 : 1);
  const show = ([warming, change]) => {
    const found = nodes([warming, change]);
    const [headline] = runs.measures;
    const pair = say(said.pair, { warming: short(warming), change: short(change) });
    for (const { row, cells } of basin) {
      const [value, before] = [found && read(row.nodes, found), read(row.nodes, reference)];
      const error = found && largest(row.errors, found);
      const known = value !== null && before !== null;
      cells[0].textContent = value === null ? none : written(row, value);
      cells[1].textContent = known ? changed(row, value - before, before) : none;
      cells[2].textContent = known && error !== null ? `${fixed(error, Math.max(1, decimals(row, error)))} ${row.unit_of_change}` : none;
    }
    for (const { row, cells, bar, share } of bands) {
      const [value, before] = [found && read(row.nodes, found), read(row.nodes, reference)];
      const known = value !== null && before !== null;
      cells[0].textContent = before === null ? none : written(row, before);
      cells[1].textContent = value === null ? none : written(row, value);
      cells[2].textContent = known ? `${signed(value - before, decimals(row, value - before))} ${row.unit_of_change}` : none;
      const left = known && before >= row.least_for_percent ? (100 * value) / before : null;
      bar.style.width = `${left === null ? 0 : Math.min(left, 150) / 20}em`;
      share.textContent = left === null ? none : `${fixed(left, 0)}\u00a0%`;
    }
    if (!found) {
      const ends = axes.flatMap(({ places }) => [places[0], places.at(-1)].map(short));
      return say(said.outside, { pair, coldest: ends[0], warmest: ends[1], driest: ends[2], wettest: ends[3] });
    }
    const [value, before] = [read(headline.nodes, found), read(headline.nodes, reference)];
    if (value === null || before === null) return say(said.without, { pair });
    const words = found.length === 1 ? said.at_node : said.between;
    return say(words, { pair, value: written(headline, value), change: changed(headline, value - before, before) });
  };

  const pair = () => axes.map((axis) => axis.typed.valueAsNumber);
  const shared = () => axes.map((axis) => `${axis.key}=${axis.typed.value}`).join("&");
  const update = (isShared) => {
    const now = pair();
    at("explorer-said").textContent = now.some(Number.isNaN) ? said.missing : show(now);
    if (isShared && !now.some(Number.isNaN)) history.replaceState(null, "", `#${shared()}`);
  };
  const set = (values) => axes.forEach((axis, place) => {
    axis.typed.value = values[place];
    axis.slider.value = values[place];
  });
  const fromAddress = () => {
    const told = new URLSearchParams(location.hash.slice(1));
    const values = axes.map((axis) => (told.has(axis.key) ? Number(told.get(axis.key)) : NaN));
    const isTold = values.every(Number.isFinite);
    set(isTold ? values : axes.map((axis) => axis.start));
    update(false);
    if (isTold) at("try-a-change").scrollIntoView();
  };

  for (const axis of axes) {
    axis.slider.addEventListener("input", () => {
      axis.typed.value = axis.slider.value;
      update(true);
    });
    axis.typed.addEventListener("input", () => {
      axis.slider.value = axis.typed.value;
      update(true);
    });
  }
  at("explorer-reference").addEventListener("click", () => {
    set(axes.map((axis) => axis.reference));
    update(true);
  });
  addEventListener("hashchange", () => {
    if (location.hash.includes(axes[0].key)) fromAddress();
  });
  at("explorer-tool").hidden = false;
  document.querySelector(".unscripted").hidden = true;
  fromAddress();
})();
