// Screen choice, the banner that says when this page stopped being updated, and the way back when the server returns.
(() => {
  "use strict";

  const key = "arraywatch.screen";
  const apply = choice => {
    if (choice === "auto") document.documentElement.removeAttribute("data-screen");
    else document.documentElement.setAttribute("data-screen", choice);
  };
  const kept = () => {
    try { return localStorage.getItem(key) ?? "auto"; } catch { return "auto"; }
  };
  apply(kept());

  document.addEventListener("change", e => {
    if (!e.target.matches("[data-theme-choice]")) return;
    apply(e.target.value);
    try { localStorage.setItem(key, e.target.value); } catch { /* storage may be forbidden: the choice then lasts for this page */ }
  });
  document.addEventListener("click", e => {
    const skip = e.target.closest("[data-skip]");
    if (!skip) return;
    e.preventDefault();
    document.getElementById(skip.dataset.skip)?.focus();
  });

  // The clock in the header comes from the server every second. When it stands still, so does everything else.
  const limit = 6000;
  let shown = "", since = performance.now(), lost = false, asking = false;
  const clock = () => document.getElementById("server-clock")?.dateTime ?? "";
  const comeBack = async () => {
    if (asking) return;
    asking = true;
    try {
      const answer = await fetch(location.href, { method: "GET", cache: "no-store" });
      if (answer.ok) location.reload();
    } catch { /* still away */ }
    asking = false;
  };
  let rejected = false;
  document.addEventListener("components-reconnect-state-changed", e => {
    if (e.detail?.state === "rejected" || e.detail?.state === "failed") rejected = true;
  });

  setInterval(() => {
    const select = document.getElementById("theme");
    if (select && select.value !== kept() && document.activeElement !== select) select.value = kept();
    const now = clock();
    const banner = document.getElementById("page-lost");
    if (now !== shown) {
      shown = now;
      since = performance.now();
      if (lost) {
        lost = false;
        rejected = false;
        banner.hidden = true;
        document.documentElement.classList.remove("lost");
      }
      return;
    }
    const still = performance.now() - since;
    if (still < limit || document.hidden) return;
    if (!lost) {
      lost = true;
      document.getElementById("page-lost-since").textContent = (shown ? shown.slice(11, 19) : "an unknown time,") + " UTC";
      banner.hidden = false;
      document.documentElement.classList.add("lost");
    }
    if (rejected || still > 30000) comeBack();
  }, 1000);
})();
