/** How much is measured. */
export interface Plan {
	runs: number;
	/** of the measurements that each run has in full */
	share: number;
}
