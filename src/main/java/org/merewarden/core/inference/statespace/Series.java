package org.merewarden.core.inference.statespace;

import org.merewarden.core.prior.Prior;

/**
 * One index or effort series: its hidden ln q, counted from the series' own mean so that units do not matter.
 *
 * @param name as in the tables
 * @param effort whether it is an effort series
 * @param logMean mean of the logarithms of its values; observations are kept relative to it
 * @param qMean prior mean of the hidden ln q
 * @param qSd prior standard deviation of it
 * @param catchability the same prior in the series' own units: index per t; F per unit of effort
 * @param scatter prior of the series' standard deviation
 */
record Series(
        String name, boolean effort, double logMean, double qMean, double qSd, Prior catchability, Prior scatter) {}
