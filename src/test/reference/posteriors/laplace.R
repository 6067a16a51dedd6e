# Laplace's approximation of ln p(data | theta) over the hidden states (Tierney & Kadane 1986) on the C++ model, with
# Hessians by automatic differentiation (Kristensen et al. 2016, J. Stat. Softw. 70(5)), at fixed theta: the prior
# medians, about the posterior medians of reference.csv, these with single parameters moved by one posterior log-sd, and
# six random points around them.
# The states' modes are looked for from twelve starts; ln_p sums over the distinct ones, ln_p_best is the highest alone.
# Also the mode of ln p(u) + ln p(data | u) over the outer parameters.
#   Rscript laplace.R CASE...
source("tables.R"); source("joint.R")
suppressMessages(library(Matrix))
compile_model()

modes_at <- function(joint, u, d) {
  names_of <- names(joint$par)
  states <- names_of != "u"
  z <- joint$par
  z[!states] <- u
  value <- function(s) { z[states] <- s; v <- joint$fn(z); if (is.finite(v)) v else 1e10 }
  slope <- function(s) { z[states] <- s; joint$gr(z)[states] }
  found <- list()
  for (level in c(-0.1, -0.7, -1.5, -2.5)) for (rate in c(-3, -1.9, -0.8)) {
    s <- z[states]
    kind <- names_of[states]
    s[kind == "x"] <- level
    s[kind == "l"] <- rate
    fit <- nlminb(s, value, slope, control = list(iter.max = 2000, eval.max = 3000, rel.tol = 1e-14))
    for (polish in 1:8) {
      z[states] <- fit$par
      h <- joint$he(z)[states, states]
      move <- tryCatch(solve(h, slope(fit$par)), error = function(e) 0)
      if (value(fit$par - move) > value(fit$par) + 1e-9) break
      fit$par <- fit$par - move
    }
    z[states] <- fit$par
    h <- joint$he(z)[states, states]
    root <- tryCatch(chol(h), error = function(e) NULL)
    if (is.null(root) || max(abs(slope(fit$par))) > 1e-5) next
    if (any(vapply(found, function(f) max(abs(f$par - fit$par)) < 0.01, TRUE))) next
    term <- -value(fit$par) + sum(states) / 2 * log(2 * pi) - sum(log(diag(root)))
    found <- c(found, list(list(par = fit$par, term = term)))
  }
  found
}

log_sum <- function(v) max(v) + log(sum(exp(v - max(v))))

for (case in commandArgs(TRUE)) {
  d <- model_data(case)
  joint <- joint_model(d, FALSE)
  free <- which(d$outer[2, ] > 0)
  posterior <- read.csv(file.path(case, "reference.csv"))
  quantile_of <- function(q) vapply(free, function(k) {
    (log(posterior[[q]][match(colnames(d$outer)[k], posterior$quantity)]) - d$outer[1, k]) / d$outer[2, k]
  }, 0)
  centre <- round(quantile_of("q50"), 1)
  spread <- round((quantile_of("q75") - quantile_of("q25")) / 1.349, 1)
  points <- rbind(0, centre)
  for (k in seq_along(free)) for (sign in c(-1, 1)) points <- rbind(points, replace(centre, k, centre[k] + sign * spread[k]))
  set.seed(20263)
  for (k in 1:6) points <- rbind(points, round(centre + spread * rnorm(length(free)), 2))
  rows <- NULL
  for (i in seq_len(nrow(points))) {
    found <- modes_at(joint, points[i, ], d)
    terms <- vapply(found, function(f) f$term, 0) - sum(dnorm(points[i, ], log = TRUE))
    theta <- exp(d$outer[1, ])
    theta[free] <- exp(d$outer[1, free] + d$outer[2, free] * points[i, ])
    rows <- rbind(rows, data.frame(t(signif(theta, 10)), ln_p = round(log_sum(terms), 5),
      ln_p_best = round(max(terms), 5), modes = length(terms), check.names = FALSE))
  }
  write.csv(rows, file.path(case, "laplace.csv"), row.names = FALSE, quote = FALSE, eol = "\n")
  print(rows, row.names = FALSE)

  marginal <- joint_model(d, TRUE)
  fit <- nlminb(marginal$par, marginal$fn, marginal$gr)
  mode <- exp(d$outer[1, free] + d$outer[2, free] * fit$par)
  write.csv(data.frame(parameter = colnames(d$outer)[free], mode = signif(mode, 6), u = round(fit$par, 5),
    ln_p_and_prior = round(-fit$objective, 5)), file.path(case, "mode.csv"), row.names = FALSE, quote = FALSE, eol = "\n")
}
