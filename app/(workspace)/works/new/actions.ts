"use server";

import { userAction } from "@/lib/action";
import { createWork } from "@/lib/works/create-work";
import { NewWork } from "@/lib/works/schema";

export const createWorkAction = userAction(NewWork, createWork);
