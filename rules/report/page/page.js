"use strict";
(() => {
  const one = (id) => document.getElementById(id);
  const findings = [...document.querySelectorAll(".finding")];
  const filter = one("filter");
  const reveal = () => { // a link to a finding opens it
    const target = one(location.hash.slice(1));
    if (!target) return;
    const found = target.matches(".finding") ? target : null;
    if (found && found.hidden) { filter.value = ""; apply(); }
    const details = target.querySelector("details");
    if (details) details.open = true;
    if (found) found.querySelector("summary").focus();
  };
  const visible = () => findings.filter((f) => !f.hidden);
  const texts = findings.map((f) => f.textContent.toLowerCase());
  function apply() { // every word has to occur
    const words = filter.value.toLowerCase().split(/\s+/).filter(Boolean);
    findings.forEach((f, i) => { f.hidden = !words.every((w) => texts[i].includes(w)); });
    document.querySelectorAll(".file").forEach((s) => { s.hidden = !s.querySelector(".finding:not([hidden])"); });
    one("shown").textContent = `${visible().length} of ${findings.length}`;
  }
  function move(step) {
    const list = visible();
    const at = list.findIndex((f) => f.contains(document.activeElement));
    const next = list[at < 0 ? (step > 0 ? 0 : list.length - 1) : Math.min(Math.max(at + step, 0), list.length - 1)];
    if (next) next.querySelector("summary").focus();
  }
  function expand() {
    const open = visible().some((f) => !f.firstElementChild.open);
    visible().forEach((f) => { f.firstElementChild.open = open; });
  }
  if (filter) {
    document.querySelector(".tools").hidden = false;
    filter.addEventListener("input", apply);
    one("all").addEventListener("click", expand);
    apply();
    document.addEventListener("keydown", (e) => {
      if (e.ctrlKey || e.altKey || e.metaKey) return;
      if (e.key === "Escape" && (filter.value || document.activeElement === filter)) {
        filter.value = "";
        apply();
        filter.blur();
      } else if (document.activeElement === filter) {
        if (e.key === "Enter") move(1);
      } else if (e.key === "/") {
        e.preventDefault();
        filter.focus();
      } else if (e.key === "j") move(1);
      else if (e.key === "k") move(-1);
    });
  }
  addEventListener("hashchange", reveal);
  reveal();
  let closed = []; // paper cannot be unfolded
  addEventListener("beforeprint", () => {
    closed = [...document.querySelectorAll("details:not([open])")];
    closed.forEach((d) => { d.open = true; });
  });
  addEventListener("afterprint", () => { closed.forEach((d) => { d.open = false; }); });
})();
