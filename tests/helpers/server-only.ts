// Stands for the package `server-only`, whose only file throws outside a server bundle.
export {};
