import { configure } from "@testing-library/react";

// One second is not enough for a page to come up where other work shares the processor. What never
// comes still fails, only later.
configure({ asyncUtilTimeout: 10_000 });
