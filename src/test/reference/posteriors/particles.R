# The case `catch-only` once more without any chain: a particle filter (Gordon, Salmond & Smith 1993, IEE Proc. F 140:
# 107-113) whose particles carry theta drawn from the prior. Season by season l is drawn from a wide normal around its
# mode given the season's catch and weighted exactly; x from its step. Nothing ever moves theta, so nothing can be stuck
# in one of the two branches; what is lost by resampling shows in the spread between independent filters.
#   Rscript particles.R [PARTICLES [FILTERS]]      n = 1, catches in every season, no index, no event
source("tables.R"); source("diagnose.R")

N <- if (length(commandArgs(TRUE)) > 0) as.numeric(commandArgs(TRUE)[1]) else 1e6
FILTERS <- if (length(commandArgs(TRUE)) > 1) as.integer(commandArgs(TRUE)[2]) else 12L
KEPT <- 5000L
d <- model_data("catch-only")
stopifnot(identical(d$fished, 1:d$T), length(d$series) == 0, length(d$mass_t) == 0, d$stocked == 0, d$outer[, "shape"] == 0)

growing <- function(p) {   # w, so that ln b(1) = x + a - w and C = (F K/r) w
  a <- p$r - exp(p$l)
  log1p(p$r * exp(p$x) * expm1(a) / a)
}
log_catch_at <- function(p) p$l + p$log_k - log(p$r) + log(growing(p))

# draws l given the catch of season t; returns ln of target over proposal
propose_l <- function(p, mean, sd, t) {
  y <- d$log_catch[t]
  s <- d$catch_sd[t]
  p$l <- pmin(1.5, pmax(mean - 3, y - p$log_k - p$x))
  for (k in 1:6) {
    c0 <- log_catch_at(p)
    p$l <- p$l + 1e-4
    slope <- (log_catch_at(p) - c0) / 1e-4
    p$l <- p$l - 1e-4
    precision <- slope^2 / s^2 + 1 / sd^2
    step <- (slope * (y - c0) / s^2 + (mean - p$l) / sd^2) / precision
    p$l <- p$l + pmax(-1, pmin(1, step))
  }
  width <- 1.3 / sqrt(precision)
  z <- rt(length(p$l), 5)
  p$l <- p$l + width * z
  p$log_weight <- dnorm(p$l, mean, sd, log = TRUE) + dnorm(y, log_catch_at(p), s, log = TRUE) - dt(z, 5, log = TRUE) +
    log(width)
  p
}

resample <- function(p) {
  top <- max(p$log_weight, na.rm = TRUE)
  w <- exp(p$log_weight - top)
  w[is.na(w)] <- 0
  evidence <<- evidence + top + log(mean(w))
  at <- findInterval((seq_along(w) - runif(1)) / length(w) * sum(w), cumsum(w)) + 1
  lapply(p, function(v) v[at])
}

filter <- function(number) {
  set.seed(20300 + number)
  evidence <<- 0
  u <- lapply(1:4, function(k) d$outer[1, k] + d$outer[2, k] * rnorm(N))
  names(u) <- colnames(d$outer)[1:4]
  p <- c(u, list(id = seq_len(N), x = d$start[1] + d$start[2] * rnorm(N), l = 0, log_weight = 0))
  p$r <- 2 * exp(p$fmsy)
  p$log_k <- p$msy_t - p$fmsy + log(2)
  for (t in 1:d$T) {
    p <- if (t == 1) propose_l(p, d$first_rate[1], d$first_rate[2], t) else propose_l(p, p$l, exp(p$harvest_sd), t)
    p <- resample(p)
    last <- p$x
    p$x <- p$x + p$r - exp(p$l) - growing(p) + exp(p$process_sd) * rnorm(N)
  }
  cat("filter", number, "ln evidence", round(evidence, 4), "theta left", length(unique(p$id)),
    "share with B < BMSY", round(mean(last < -log(2)), 4), "\n")
  p$x_last <- last
  some <- sample(N, KEPT)
  lapply(p[c("msy_t", "fmsy", "process_sd", "harvest_sd", "x_last", "x", "l")], function(v) v[some])
}

filters <- lapply(seq_len(FILTERS), filter)
column <- function(name) sapply(filters, function(f) f[[name]])
theta <- lapply(c("msy_t", "fmsy", "process_sd", "harvest_sd"), column)
names(theta) <- colnames(d$outer)[1:4]
theta$shape <- 0 * theta$msy_t
rows <- summarise(quantities(d, theta, column("x_last"), column("x"), column("l")), "particles")
# errors: the spread of the filters' own quantiles, in place of chains' autocorrelation
for (p in names(probabilities)) {
  rows[[sub("q", "mcse", p)]] <- signif(vapply(quantities(d, theta, column("x_last"), column("x"), column("l")),
    function(m) sd(apply(m, 2, quantile, probabilities[[p]])) / sqrt(FILTERS), 0), 6)
}
rows$ess <- NA
store("catch-only", rows)
print(rows[c("quantity", "year", "q05", "q50", "q95", "mcse50", "rhat")], row.names = FALSE)
