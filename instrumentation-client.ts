import { config } from "zod";

// zod's compiled parsers probe `new Function`, which the content policy forbids and browsers report.
config({ jitless: true });
