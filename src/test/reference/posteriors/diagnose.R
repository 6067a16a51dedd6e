# Rank-normalised split R-hat and bulk effective size (Vehtari et al. 2021, Bayesian Anal. 16: 667-718), and the
# table of quantiles with their Monte-Carlo errors. draws: one matrix [iteration, chain] per quantity.

split_chains <- function(m) {
  half <- nrow(m) %/% 2
  cbind(m[seq_len(half), , drop = FALSE], m[nrow(m) - half + seq_len(half), , drop = FALSE])
}

normal_scores <- function(m) {
  m[] <- qnorm((rank(m) - 0.375) / (length(m) + 0.25))
  m
}

plain_rhat <- function(m) {
  n <- nrow(m)
  within <- mean(apply(m, 2, var))
  sqrt(((n - 1) / n * within + var(colMeans(m))) / within)
}

rhat <- function(m) max(
  plain_rhat(normal_scores(split_chains(m))),
  plain_rhat(normal_scores(split_chains(abs(m - median(m))))))

# Effective size from the autocovariances of split chains by Geyer's initial monotone sequence.
effective <- function(m) {
  m <- split_chains(m)
  n <- nrow(m)
  size <- 2^ceiling(log2(2 * n))
  autocovariance <- apply(m, 2, function(chain) {
    f <- fft(c(chain - mean(chain), rep(0, size - n)))
    Re(fft(Mod(f)^2, inverse = TRUE))[1:n] / size / n
  })
  within <- mean(autocovariance[1, ]) * n / (n - 1)
  total <- (n - 1) / n * within + var(colMeans(m))
  rho <- 1 - (within - rowMeans(autocovariance) * n / (n - 1)) / total
  rho[1] <- 1
  pairs <- rho[seq(1, n - 1, 2)] + rho[seq(2, n, 2)]
  last <- which(pairs < 0)[1] - 1
  if (is.na(last)) last <- length(pairs)
  min(length(m) * log10(length(m)), length(m) / (2 * sum(cummin(pairs[seq_len(last)])) - 1))
}

bulk_effective <- function(m) effective(normal_scores(m))

probabilities <- c(q025 = 0.025, q05 = 0.05, q10 = 0.1, q25 = 0.25, q50 = 0.5, q75 = 0.75, q90 = 0.9, q95 = 0.95, q975 = 0.975)

# Standard error of a quantile: the binomial spread of its rank over the effective size of {draw <= quantile}, read
# back as a distance between quantiles (the beta interval of Vehtari et al. 2021, section 4.4).
quantile_error <- function(m, p) {
  at <- (m <= quantile(m, p)) + 0
  size <- effective(at)
  edges <- qbeta(pnorm(c(-1, 1)), size * p + 1, size * (1 - p) + 1)
  unname(diff(quantile(m, edges)) / 2)
}

summarise <- function(draws, sampler) {
  rows <- lapply(names(draws), function(name) {
    m <- draws[[name]]
    part <- strsplit(name, "@")[[1]]
    error <- vapply(probabilities, function(p) quantile_error(m, p), 0)
    names(error) <- sub("q", "mcse", names(error))
    data.frame(
      sampler = sampler, quantity = part[1], year = if (length(part) > 1) part[2] else "", mean = mean(m), sd = sd(m),
      t(quantile(m, probabilities, names = FALSE) |> setNames(names(probabilities))),
      t(error), ess = round(bulk_effective(m)), rhat = rhat(m))
  })
  rows <- do.call(rbind, rows)
  numbers <- vapply(rows, is.numeric, TRUE) & names(rows) != "ess"
  rows[numbers] <- lapply(rows[numbers], signif, 6)
  rows
}

# Replaces one sampler's rows in the case's reference.csv.
store <- function(case, rows) {
  file <- file.path(case, "reference.csv")
  if (file.exists(file)) {
    old <- read.csv(file, colClasses = c(year = "character"))
    rows <- rbind(old[old$sampler != rows$sampler[1], ], rows)
  }
  write.csv(rows[order(rows$sampler), ], file, row.names = FALSE, quote = FALSE, na = "", eol = "\n")
}

# What is asked of every draw: theta by name (natural logarithms), x at the last season and the coming one, l at the last.
quantities <- function(d, theta, x_last, x_next, l_last) {
  fox <- d$outer[2, "shape"] == 0 && exp(d$outer[1, "shape"]) < 1e-3
  n <- exp(theta[["shape"]])
  log_k_over_bmsy <- if (fox) 1 + 0 * n else log1p(n) / n
  draws <- lapply(theta, exp)
  draws$k_t <- exp(theta$msy_t - theta$fmsy + log_k_over_bmsy)
  draws[[paste0("b_over_bmsy@", d$last)]] <- exp(x_last + log_k_over_bmsy)
  draws[[paste0("b_over_bmsy@", d$last + 1)]] <- exp(x_next + log_k_over_bmsy)
  draws[[paste0("f_over_fmsy@", d$last)]] <- exp(l_last - theta$fmsy)
  draws[!names(draws) %in% colnames(d$outer)[d$outer[2, ] == 0]]
}
