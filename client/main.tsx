import { createRoot } from 'react-dom/client';
import { App } from './app/app.tsx';
import './styles/theme.css';

const root = document.getElementById('root');
if (root === null) throw new Error('The page has no root element.');
createRoot(root).render(<App />);
