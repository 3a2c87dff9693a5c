// Stands in for the package of that name, which refuses to load outside a server bundle.
export {}
