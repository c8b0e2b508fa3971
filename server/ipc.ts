/** The language server as a process that an extension starts: it speaks over the channel between the two. */
import { serve } from "./language-server.ts";

serve("ipc");
