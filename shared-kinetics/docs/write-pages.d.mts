/** Every page by its path under `docs`, made from the docstrings. */
export declare function pages(): Map<string, string>
