// element makes an element with attributes and children: nodes or texts.
export function element(name, attributes = {}, children = []) {
  const e = document.createElement(name);
  for (const [key, value] of Object.entries(attributes)) e.setAttribute(key, value);
  e.append(...[children].flat());
  return e;
}
