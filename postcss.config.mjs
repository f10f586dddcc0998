const postcssConfig = { plugins: { '@tailwindcss/postcss': {} } };

export default postcssConfig;
