import { z } from "zod";
import "./styles/index.css";

// Before any contract is made: zod's compiled parsers need `eval`, which the content-security
// policy refuses. The application is imported afterwards because modules run imports first.
z.config({ jitless: true });

void import("./app/start.tsx").then(({ start }) => start());
