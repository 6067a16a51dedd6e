# Gibbs and slice sampling by JAGS (Plummer 2003), shape 1 only. Four chains one after the other, thinned so that 5,000
# draws of each are kept.
#   Rscript gibbs.R CASE [ITERATIONS]
suppressMessages(library(rjags))
source("tables.R"); source("diagnose.R")

case <- commandArgs(TRUE)[1]
iterations <- if (length(commandArgs(TRUE)) > 1) as.integer(commandArgs(TRUE)[2]) else 100000L
thin <- max(1L, iterations %/% 5000L)
d <- model_data(case)
stopifnot(d$outer[, "shape"] == 0)
P <- ncol(d$outer)
free <- d$outer[2, ] > 0
data <- c(d[c("T", "closed", "stocked", "fished", "log_catch", "catch_sd", "index_t", "index_series", "index_time",
  "index_log", "index_cv", "mass_t", "mass_time", "mass_log", "mass_cv", "effort_t", "effort_series", "effort_log",
  "start", "first_rate")], list(
  P = P, middle = d$outer[1, ], spread = ifelse(free, d$outer[2, ], 1), theta = ifelse(free, NA, d$outer[1, ]),
  n_catch = length(d$fished), n_index = length(d$index_t), n_mass = length(d$mass_t), n_effort = length(d$effort_t),
  n_series = length(d$series), q_mean = d$q[1, ], q_sd = d$q[2, ]))
indexed <- length(d$index_t) > 0
# without an index the level is x_1 itself: X_1 = 0 and A = -x_1 under a flat prior of A
data <- c(data, if (indexed) list(level_mean = d$q[1, 1], level_sd = d$q[2, 1], level_on_K = 1,
  D = c(0, rep(NA, length(d$series) - 1))) else list(level_mean = 0, level_sd = 1000, level_on_K = 0, X = c(0, rep(NA, d$T))))
data <- data[lengths(data) > 0]
began <- proc.time()[["elapsed"]]
chains <- lapply(1:4, function(k) {
  set.seed(500 + k)
  theta <- ifelse(free, d$outer[1, ] + 0.5 * d$outer[2, ] * rnorm(P), NA)
  rate <- rnorm(1, -1.9, 0.3)
  x <- -runif(1, 0.2, 1)
  log_k <- log(2) + d$outer[1, 1] - d$outer[1, 2]
  A <- (if (indexed) mean(d$index_log[d$index_series == 1]) else 0) - x
  start <- list(theta = theta, A = A, X = c(if (indexed) x + A else NA, rep(x + A, d$T)), v = rep(log_k + x + rate, d$T),
    .RNG.name = "base::Mersenne-Twister", .RNG.seed = 500 + k)
  model <- jags.model("model.jags", data, start, n.chains = 1, n.adapt = 2000, quiet = TRUE)
  update(model, iterations %/% 10, progress.bar = "none")
  kept <- coda.samples(model, c("theta", sprintf("x[%d]", d$T + 0:1), sprintf("l[%d]", d$T)), iterations, thin,
    progress.bar = "none")
  cat(case, "chain", k, "seconds", round(proc.time()[["elapsed"]] - began), "\n")
  as.matrix(kept[[1]])
})
column <- function(name) sapply(chains, function(m) m[, name])
theta <- lapply(seq_len(P), function(k) column(sprintf("theta[%d]", k)))
names(theta) <- colnames(d$outer)
x <- function(t) column(sprintf("x[%d]", t))
rows <- summarise(quantities(d, theta, x(d$T), x(d$T + 1), column(sprintf("l[%d]", d$T))), "jags")
store(case, rows)
print(rows[c("quantity", "year", "q05", "q50", "q95", "mcse50", "ess", "rhat")], row.names = FALSE)
cat("seconds", round(proc.time()[["elapsed"]] - began), "\n")
