import 'katex/dist/katex.min.css';

export { default } from 'katex';
