export const chartFont = "'Source Sans 3 Variable', 'Source Sans 3', sans-serif"
