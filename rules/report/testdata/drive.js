// Uses the page as a reader does and leaves in #outcome what went wrong.
"use strict";
(() => {
  const wrong = [];
  const check = (ok, what) => { if (!ok) wrong.push(what); };
  addEventListener("error", (e) => wrong.push("script error: " + e.message));
  document.addEventListener("securitypolicyviolation", (e) => wrong.push("refused by the policy: " + e.violatedDirective));
  const press = (key) => document.activeElement.dispatchEvent(new KeyboardEvent("keydown", { key, bubbles: true, cancelable: true }));
  const type = (text) => {
    const filter = document.getElementById("filter");
    filter.value = text;
    filter.dispatchEvent(new Event("input", { bubbles: true }));
  };
  const all = () => [...document.querySelectorAll(".finding")];
  const seen = () => all().filter((f) => f.getClientRects().length > 0 || (!f.hidden && !f.parentElement.hidden));
  addEventListener("load", () => setTimeout(() => {
    const filter = document.getElementById("filter");
    const n = all().length;
    check(n >= 3, "the page has findings");
    check(!filter.closest(".tools").hidden, "the tools are shown");
    press("/");
    check(document.activeElement === filter, "/ goes to the filter");
    type("MIRRORED nothing-has-this");
    check(seen().length === 0, "a filter that fits nothing leaves nothing");
    type("MIRRORED lidar");
    check(seen().length === 1, "a filter leaves what fits");
    check(document.getElementById("shown").textContent === `1 of ${n}`, "the number of those left is shown");
    press("Escape");
    check(seen().length === n && filter.value === "", "Esc shows everything again");
    press("j");
    check(all()[0].contains(document.activeElement), "j goes to the first");
    press("j");
    check(all()[1].contains(document.activeElement), "j goes to the next");
    press("k");
    check(all()[0].contains(document.activeElement), "k goes back");
    document.activeElement.click();
    check(all()[0].querySelector("details").open, "a finding opens");
    document.getElementById("all").click();
    check(all().every((f) => f.querySelector("details").open), "all open");
    check(document.querySelectorAll("figure.turn svg .sector").length > 0, "there is a drawing");
    location.hash = "#" + all()[2].id;
    setTimeout(() => {
      check(all()[2].contains(document.activeElement), "a link goes to its finding");
      check(performance.getEntriesByType("resource").length === 0, "nothing is requested");
      const out = document.createElement("pre");
      out.id = "outcome";
      out.textContent = wrong.join("; ") || "nothing wrong";
      document.body.append(out);
    }, 200);
  }, 50));
})();
