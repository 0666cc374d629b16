// Lint rules of this project's own, for what the browser renders.

const nameOf = (element) => {
  const { name } = element.openingElement ?? {};
  if (!name) return '';
  return name.type === 'JSXMemberExpression' ? `${name.object.name}.${name.property.name}` : name.name;
};

/** The element a node is rendered in; fragments are looked through. */
function elementAround(node) {
  let parent = node.parent;
  while (parent && parent.type !== 'JSXElement') {
    if (parent.type === 'JSXAttribute' || parent.type.endsWith('Function') || parent.type === 'ArrowFunctionExpression') return undefined;
    parent = parent.parent;
  }
  return parent;
}

/** Words outside a text component: React Native Web drops them or prints them unstyled, and a screen reader meets them nameless. */
const rawText = {
  meta: {
    type: 'problem',
    schema: [{ type: 'object', properties: { textElements: { type: 'string' } }, additionalProperties: false }],
    messages: { raw: 'Words ({{words}}) stand in <{{element}}>, which is no text component. Put them into <Text>.' },
  },
  create(context) {
    const isTextElement = new RegExp(context.options[0]?.textElements ?? '^Text$');
    const check = (node, words) => {
      if (words.trim() === '') return;
      const element = elementAround(node);
      if (!element || isTextElement.test(nameOf(element))) return;
      context.report({ node, messageId: 'raw', data: { words: words.trim().slice(0, 30), element: nameOf(element) } });
    };
    const rendered = (expression) => {
      if (expression.type === 'Literal' && typeof expression.value === 'string') check(expression, expression.value);
      else if (expression.type === 'TemplateLiteral') check(expression, expression.quasis.map((part) => part.value.raw).join('…') || '${…}');
      else if (expression.type === 'ConditionalExpression') [expression.consequent, expression.alternate].forEach(rendered);
      else if (expression.type === 'LogicalExpression') rendered(expression.right);
    };
    return {
      JSXText: (node) => check(node, node.value),
      JSXExpressionContainer: (node) => {
        if (node.parent.type !== 'JSXAttribute') rendered(node.expression);
      },
    };
  },
};

const has = (opening, names) => opening.attributes.some(
  (attribute) => attribute.type === 'JSXSpreadAttribute' || names.includes(attribute.name.name));

const nameProps = ['aria-label', 'aria-labelledby', 'accessibilityLabel', 'accessibilityLabelledBy'];

/** Whatever can be pressed or typed into says to a screen reader what it is and what it is called. */
const namedControls = {
  meta: {
    type: 'problem',
    schema: [],
    messages: {
      role: '<{{element}}> needs a role: without one it is just a box to a screen reader.',
      name: '<{{element}}> needs a name: aria-label, aria-labelledby, or words inside it.',
    },
  },
  create: (context) => ({
    JSXElement(node) {
      const element = nameOf(node);
      const { openingElement } = node;
      const report = (messageId) => context.report({ node: openingElement, messageId, data: { element } });
      if (element === 'Pressable' || element.startsWith('Touchable')) {
        if (!has(openingElement, ['role', 'accessibilityRole'])) report('role');
        const hasContent = node.children.some((child) => child.type !== 'JSXText' || child.value.trim() !== '');
        if (!hasContent && !has(openingElement, nameProps)) report('name');
      }
      if (element === 'TextInput' && !has(openingElement, nameProps)) report('name');
    },
  }),
};

export default { rules: { 'raw-text': rawText, 'named-controls': namedControls } };
