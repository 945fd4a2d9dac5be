/**
 * The small script of a page: exact values on hover, a source followed through all figures, problems filtered. The page
 * is whole without it. It builds no html from texts and evaluates nothing.
 */
export const PAGE_SCRIPT = `
(() => {
  const all = (selector, root = document) => [...root.querySelectorAll(selector)];
  const byId = (id) => document.getElementById(id);
  const facts = JSON.parse(byId("facts").textContent);
  const tip = byId("tip");
  const bar = byId("following");
  const choice = byId("follow");
  const filter = byId("filter");
  let followed = null;
  document.documentElement.classList.add("js");
  byId("controls").hidden = false;

  function showTip(target, x, y) {
    tip.textContent = target.dataset.tip;
    tip.hidden = false;
    const box = tip.getBoundingClientRect();
    const left = Math.min(Math.max(4, x + 14), innerWidth - box.width - 4);
    const top = y + 18 + box.height > innerHeight ? y - box.height - 10 : y + 18;
    tip.style.left = left + "px";
    tip.style.top = Math.max(4, top) + "px";
  }
  function hideTip() {
    tip.hidden = true;
  }

  function follow(index) {
    followed = index;
    for (const mark of all(".chart [data-s]")) {
      mark.classList.toggle("dim", index !== null && mark.dataset.s !== index);
    }
    for (const row of all("tr[data-s]")) row.classList.toggle("followed", row.dataset.s === index);
    for (const link of all("a.source")) link.setAttribute("aria-pressed", String(link.dataset.s === index));
    choice.value = index ?? "";
    bar.hidden = index === null;
    if (index === null) return;
    const source = facts.sources[Number(index)];
    byId("following-name").textContent = source.id;
    byId("following-about").href = "#" + source.anchor;
  }

  for (const link of all("a.source")) {
    link.setAttribute("role", "button");
    link.title = "Follow this source through all figures";
  }
  document.addEventListener("click", (event) => {
    const target = event.target.closest("a.source, .chart [data-s]");
    if (target === null) return;
    event.preventDefault();
    follow(target.dataset.s === followed ? null : target.dataset.s);
    if (target.dataset.tip !== undefined) showTip(target, event.clientX, event.clientY);
  });
  document.addEventListener("keydown", (event) => {
    if (event.key === "Escape") {
      follow(null);
      hideTip();
    }
    if (event.key === " " && event.target.matches("a.source")) {
      event.preventDefault();
      event.target.click();
    }
  });
  choice.addEventListener("change", () => follow(choice.value === "" ? null : choice.value));
  byId("stop").addEventListener("click", () => follow(null));

  document.addEventListener("pointerover", (event) => {
    const target = event.target.closest("[data-tip]");
    if (target === null) hideTip();
    else showTip(target, event.clientX, event.clientY);
  });
  addEventListener("scroll", hideTip, { passive: true });

  filter.addEventListener("input", () => {
    const words = filter.value.toLowerCase().split(/\\s+/).filter(Boolean);
    let shown = 0;
    facts.problems.forEach((problem, i) => {
      const text = (problem.id + " " + problem.title).toLowerCase();
      const keep = words.every((word) => text.includes(word));
      if (keep) shown++;
      for (const part of all('[data-p="' + i + '"]')) part.classList.toggle("away", !keep);
    });
    byId("shown").textContent = words.length === 0 ? "" : shown + " of " + facts.problems.length + " shown";
  });

  // Only what really scrolls is a stop for the keyboard; tables behind a disclosure are measured when it opens.
  function stops() {
    for (const part of all(".scroll")) {
      const scrolls = part.scrollWidth > part.clientWidth + 1 || part.scrollHeight > part.clientHeight + 1;
      if (scrolls) part.tabIndex = 0;
      else part.removeAttribute("tabindex");
    }
  }
  stops();
  addEventListener("resize", stops);
  for (const part of all("details")) part.addEventListener("toggle", stops);

  const links = new Map(all("nav a").map((link) => [link.hash.slice(1), link]));
  const watched = all("[data-section]");
  if ("IntersectionObserver" in window) {
    const seen = new Set();
    const watch = new IntersectionObserver((entries) => {
      for (const entry of entries) {
        if (entry.isIntersecting) seen.add(entry.target);
        else seen.delete(entry.target);
      }
      const current = watched.filter((part) => seen.has(part)).pop();
      for (const [id, link] of links) {
        if (current !== undefined && id === current.id) link.setAttribute("aria-current", "true");
        else link.removeAttribute("aria-current");
      }
    }, { rootMargin: "0px 0px -70% 0px" });
    for (const part of watched) watch.observe(part);
  }
})();
`;
