(function () {
  "use strict";
  document.documentElement.classList.add("js");
  const one = (selector, within) => (within || document).querySelector(selector);
  const all = (selector, within) => Array.from((within || document).querySelectorAll(selector));
  const texts = (row) => Array.from(row.cells, (cell) => cell.textContent.trim());

  function rowsOf(id) {
    const region = document.getElementById(id);
    return region ? all("tbody tr", region) : [];
  }

  function mark(rows, chosen) {
    rows.forEach((row) => row.removeAttribute("aria-current"));
    if (chosen) chosen.setAttribute("aria-current", "true");
  }

  function buttons(bar, names, pressed, choose) {
    const made = names.map((name) => {
      const button = document.createElement("button");
      button.type = "button";
      button.textContent = name;
      button.addEventListener("click", () => press(name));
      bar.append(button);
      return button;
    });
    function press(name) {
      made.forEach((button) => button.setAttribute("aria-pressed", String(button.textContent === name)));
      choose(name);
    }
    bar.hidden = false;
    press(pressed);
  }

  // Torque: the slider reads rows of the table.
  const slider = one("#torque-slider");
  const torques = rowsOf("torques");
  if (slider && torques.length > 0) {
    const readout = one("#torque-readout");
    const heads = all("thead th", document.getElementById("torques")).map((head) => {
      const unit = one(".unit", head);
      return [head.firstChild.textContent.trim(), unit ? " " + unit.textContent : ""];
    });
    const show = () => {
      const row = torques[Number(slider.value)];
      const parts = texts(row).map((text, at) => heads[at][0] + " " + text + heads[at][1]);
      readout.textContent = parts.join(", ");
      slider.setAttribute("aria-valuetext", parts[0]);
      mark(torques, row);
    };
    slider.addEventListener("input", show);
    slider.closest(".controls").hidden = false;
    show();
  }

  // Medium: likewise.
  const media = rowsOf("media");
  const medium = one('[data-switch="medium"]');
  if (medium && media.length > 0) {
    const readout = one("#medium-readout");
    const names = media.map((row) => texts(row)[0]);
    const now = names.includes(medium.dataset.now) ? medium.dataset.now : names[0];
    readout.hidden = false;
    buttons(medium, names, now, (name) => {
      const row = media[names.indexOf(name)];
      const [, whole, added, rise] = texts(row);
      readout.textContent = "In " + name + ": source to sink " + whole + " K/W, added by joint " + added + " K/W" +
        (rise === "–" ? "" : ", rise " + rise + " K");
      mark(media, row);
    });
  }

  // Cases: one at a time on the screen, all of them on paper.
  const bar = one('[data-switch="case"]');
  if (bar) {
    const cases = all(".case");
    const every = "all";
    const names = cases.map((each) => each.dataset.case);
    buttons(bar, names.concat(every), every, (name) => {
      cases.forEach((each) => {
        each.style.display = name === every || each.dataset.case === name ? "" : "none";
      });
    });
  }

  // Maps: values under the pointer.
  const stored = one("#values");
  const pointer = one("#pointer");
  if (stored && pointer) {
    const values = JSON.parse(stored.textContent);
    const [left, lower, right, upper] = values.window;
    const [columns, rows] = values.size;
    const wanted = (right - left) / (upper - lower);
    const idle = pointer.textContent;
    pointer.hidden = false;
    const read = (image, event) => {
      const box = image.getBoundingClientRect();
      const across = (event.clientX - box.left) / box.width;
      const up = (box.bottom - event.clientY) / box.height;
      if (across < 0 || across >= 1 || up < 0 || up >= 1) return false;
      const at = Math.floor(up * rows) * columns + Math.floor(across * columns);
      const parts = values.layers
        .filter((layer) => layer.values[at] !== null)
        .map((layer) => layer.name + " " + layer.values[at] + " " + layer.unit);
      const told = (length) => length.toFixed(values.places) + " " + values.length;
      const place = "x " + told(left + across * (right - left)) + ", y " +
        told(lower + up * (upper - lower)) + ": ";
      pointer.textContent = place + (parts.length > 0 ? parts.join(", ") : "no face on face");
      return true;
    };
    all("figure.plan svg").forEach((svg) => {
      const maps = all("image", svg).filter((image) => {
        const shape = image.width.baseVal.value / image.height.baseVal.value;
        return Math.abs(shape / wanted - 1) < 0.02;
      });
      svg.addEventListener("pointermove", (event) => {
        if (!maps.some((image) => read(image, event))) pointer.textContent = idle;
      });
      svg.addEventListener("pointerleave", () => { pointer.textContent = idle; });
    });
  }
})();
