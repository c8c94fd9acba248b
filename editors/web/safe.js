// What a hover may hold: text, tables, code, links to pages, pictures that come with it. Everything else is left out.
const ALLOWED = new Set(
  "A B BLOCKQUOTE BR CODE DEL DIV EM H1 H2 H3 H4 H5 H6 HR I IMG LI OL P PRE SPAN STRONG SUB SUP TABLE TBODY TD TH THEAD TR UL".split(" "),
);
const KEPT = { A: ["href"], IMG: ["src", "alt"], TD: ["align"], TH: ["align"], CODE: ["class"], SPAN: ["class"] };

export function safe(html) {
  const page = new DOMParser().parseFromString(html, "text/html");
  for (const element of [...page.body.querySelectorAll("*")]) {
    if (!ALLOWED.has(element.tagName)) {
      element.remove();
      continue;
    }
    for (const { name, value } of [...element.attributes]) {
      const kept = (KEPT[element.tagName] || []).includes(name);
      const led = name !== "href" || /^https?:/.test(value);
      const shown = name !== "src" || /^data:image\/svg\+xml[;,]/.test(value);
      if (!kept || !led || !shown) element.removeAttribute(name);
    }
  }
  return page.body.innerHTML;
}
