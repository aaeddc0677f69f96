// Imported first by the worker: the database client reads this when it opens.
process.env["EBBMARK_PROCESS"] = "worker";
