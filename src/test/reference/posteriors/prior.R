# The case `marked` once more without any chain: draws of the priors rolled forward by the model's equations and weighted
# by the one biomass record (importance sampling). Only for three seasons, no catches and n = 1.
#   Rscript prior.R
source("tables.R"); source("diagnose.R")
set.seed(20262)
d <- model_data("marked")
stopifnot(d$T == 3, d$mass_t == 1, d$outer[, "shape"] == 0, length(d$fished) == 0)
N <- 1e6
normal <- function(prior) prior[1] + prior[2] * rnorm(N)
theta <- apply(d$outer, 2, normal, simplify = FALSE)
r <- 2 * exp(theta$fmsy)
log_k <- theta$msy_t - theta$fmsy + log(2)
log_biomass <- function(x, l, time) {
  a <- r - exp(l)
  -log1p(expm1(-x) * exp(-a * time) - exp(l) * expm1(-a * time) / a)
}
x <- list(normal(d$start))
l <- list(normal(d$first_rate))
for (t in 1:3) {
  x[[t + 1]] <- log_biomass(x[[t]], l[[t]], 1) + exp(theta$process_sd) * rnorm(N)
  if (t < 3) l[[t + 1]] <- l[[t]] + exp(theta$harvest_sd) * rnorm(N)
}
seen <- log_k + log_biomass(x[[1]], l[[1]], d$mass_time)
weight <- dnorm(d$mass_log, seen, d$mass_cv)
independent <- sum(weight)^2 / sum(weight^2)
chosen <- matrix(sample(N, 2e5, TRUE, weight), ncol = 4)   # equally weighted, some of them twice
cat("effective draws", round(independent), "of", N, " ln evidence", log(mean(weight)), "\n")
pick <- function(v) matrix(v[chosen], ncol = 4)
rows <- summarise(quantities(d, lapply(theta, pick), pick(x[[3]]), pick(x[[4]]), pick(l[[3]])), "prior-weighted")
errors <- grep("^mcse", names(rows))
rows[errors] <- signif(rows[errors] * sqrt(1 + 2e5 / independent), 6)
rows$ess <- round(1 / (1 / 2e5 + 1 / independent))
store("marked", rows)
print(rows[c("quantity", "year", "q05", "q50", "q95", "mcse50", "ess", "rhat")], row.names = FALSE)
