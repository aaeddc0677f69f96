-- The worker erases the addresses of those who left and of requests that nobody confirmed.
grant delete on subscriptions to ebbmark_worker;
